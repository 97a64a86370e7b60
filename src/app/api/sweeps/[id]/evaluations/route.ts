import { handle } from '@/http/handle';
import * as operations from '@/schemas/runActs';
import { evaluateSweep, listEvaluations } from '@/services/evaluations';

export const GET = handle(operations.listEvaluations, ({ actor, params, query }) =>
  listEvaluations(actor, params.id, query),
);
export const POST = handle(operations.evaluateSweep, ({ actor, params, body }) =>
  evaluateSweep(actor, params.id, body),
);
