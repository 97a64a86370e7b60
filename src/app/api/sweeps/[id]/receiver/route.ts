import { handle } from '@/http/handle';
import * as operations from '@/schemas/receiver';
import { readReceiverCheck } from '@/services/receiverCheck';

export const GET = handle(operations.readReceiverCheck, ({ actor, params }) => readReceiverCheck(actor, params.id));
