import { handle } from '@/http/handle';
import * as operations from '@/schemas/sweep';
import { listCandidates } from '@/services/sweeps';

export const GET = handle(operations.listCandidates, ({ actor, params, query }) =>
  listCandidates(actor, params.id, query),
);
