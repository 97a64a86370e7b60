import { handle } from '@/http/handle';
import { readSweepFile as operation } from '@/schemas/sweepFile';
import { readSweepFile } from '@/services/sweepFiles';

export const GET = handle(operation, ({ actor, params }) => readSweepFile(actor, params.id));
