import { handle } from '@/http/handle';
import * as operations from '@/schemas/session';
import { endSession } from '@/services/sessions';

export const DELETE = handle(operations.endSession, ({ actor, params }) => endSession(actor, params.id));
