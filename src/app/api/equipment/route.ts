import { handle } from '@/http/handle';
import * as operations from '@/schemas/bench';
import { listEquipment } from '@/services/equipment';

export const GET = handle(operations.listEquipment, ({ actor, query }) => listEquipment(actor, query));
