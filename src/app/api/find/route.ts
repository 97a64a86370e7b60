import { handle } from '@/http/handle';
import * as operations from '@/schemas/find';
import { findEverywhere } from '@/services/find';

export const GET = handle(operations.findEverywhere, ({ actor, query }) => findEverywhere(actor, query));
