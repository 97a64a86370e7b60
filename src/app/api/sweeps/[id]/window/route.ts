import { handle } from '@/http/handle';
import * as operations from '@/schemas/sweep';
import { readWindow } from '@/services/sweepWindow';

export const GET = handle(operations.readWindow, ({ actor, params, query }) => readWindow(actor, params.id, query));
