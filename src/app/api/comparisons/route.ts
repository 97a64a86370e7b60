import { handle } from '@/http/handle';
import * as operations from '@/schemas/comparison';
import { compareSweeps } from '@/services/comparison';

export const GET = handle(operations.compareSweeps, ({ actor, query }) => compareSweeps(actor, query));
