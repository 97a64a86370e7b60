import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { createSample } from '@/services/samples';

export const POST = handle(operations.createSample, ({ actor, params, body }) => createSample(actor, params.id, body));
