import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { changeSample, readSample } from '@/services/samples';

export const GET = handle(operations.readSample, ({ actor, params }) => readSample(actor, params.id));
export const PATCH = handle(operations.changeSample, ({ actor, params, version, body }) =>
  changeSample(actor, params.id, version, body),
);
