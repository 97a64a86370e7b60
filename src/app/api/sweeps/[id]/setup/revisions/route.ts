import { handle } from '@/http/handle';
import * as operations from '@/schemas/setup';
import { listSetupRevisions } from '@/services/setup';

export const GET = handle(operations.listSetupRevisions, ({ actor, params, query }) =>
  listSetupRevisions(actor, params.id, query),
);
