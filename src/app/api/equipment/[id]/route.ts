import { handle } from '@/http/handle';
import * as operations from '@/schemas/bench';
import { readEquipment } from '@/services/equipment';

export const GET = handle(operations.readEquipment, ({ actor, params }) => readEquipment(actor, params.id));
