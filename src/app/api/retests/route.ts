import { handle } from '@/http/handle';
import * as operations from '@/schemas/retest';
import { listRetests } from '@/services/retests';

export const GET = handle(operations.listRetests, ({ actor, query }) => listRetests(actor, query));
