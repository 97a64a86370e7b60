import { handle } from '@/http/handle';
import * as operations from '@/schemas/job';
import { createState } from '@/services/samples';

export const POST = handle(operations.createState, ({ actor, params, body }) => createState(actor, params.id, body));
