import { handle } from '@/http/handle';
import * as operations from '@/schemas/sweep';
import { readSweep } from '@/services/sweeps';

export const GET = handle(operations.readSweep, ({ actor, params }) => readSweep(actor, params.id));
