import { handle } from '@/http/handle';
import * as operations from '@/schemas/session';
import { listSessions } from '@/services/sessions';

export const GET = handle(operations.listSessions, ({ actor, query }) => listSessions(actor, query));
