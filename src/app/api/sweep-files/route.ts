import { handle } from '@/http/handle';
import { receiveFile } from '@/http/multipart';
import { createSweepFile as operation } from '@/schemas/sweepFile';
import { createSweepFile } from '@/services/sweepFiles';

export const POST = handle(operation, ({ actor, file }) => createSweepFile(actor, file), receiveFile);
