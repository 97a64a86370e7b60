import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { listSamples } from '@/services/samples';

export const GET = handle(operations.listSamples, ({ actor, query }) => listSamples(actor, query));
