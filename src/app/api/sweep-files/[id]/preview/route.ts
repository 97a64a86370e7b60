import { handle } from '@/http/handle';
import { previewSweepFile as operation } from '@/schemas/sweep';
import { previewSweepFile } from '@/services/judgeFile';

export const POST = handle(operation, ({ actor, params, body }) => previewSweepFile(actor, params.id, body));
