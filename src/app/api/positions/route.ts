import { handle } from '@/http/handle';
import * as operations from '@/schemas/booking';
import { enterPosition, listPositions } from '@/services/positions';

export const GET = handle(operations.listPositions, ({ actor, query }) => listPositions(actor, query));
export const POST = handle(operations.enterPosition, ({ actor, body }) => enterPosition(actor, body));
