import { handle } from '@/http/handle';
import { receiveSweepFile } from '@/http/spool';
import { createSweepFile as operation } from '@/schemas/sweepFile';
import { dropSweepFile, holdSweepFile, showSweepFile } from '@/services/sweepFiles';

export const POST = handle(
  operation,
  {
    stage: ({ actor, file }) => holdSweepFile(actor, file),
    publish: ({ actor }, upload) => showSweepFile(actor, upload),
    drop: dropSweepFile,
  },
  receiveSweepFile,
);
