import { handle } from '@/http/handle';
import { readSweepFile as operation } from '@/schemas/sweepFile';
import { readSweepFile } from '@/services/sweepFiles';

export const GET = handle(operation, ({ actor, params, query }) => readSweepFile(actor, params.id, query.sweep));
