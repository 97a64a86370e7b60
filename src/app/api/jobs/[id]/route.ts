import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { changeJob, readJob } from '@/services/jobs';

export const GET = handle(operations.readJob, ({ actor, params }) => readJob(actor, params.id));
export const PATCH = handle(operations.changeJob, ({ actor, params, version, body }) =>
  changeJob(actor, params.id, version, body),
);
