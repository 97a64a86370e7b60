'use client';

import { FilePreview } from '@/app/(lab)/sweeps/new/FilePreview';
import { RefusedFile } from '@/app/(lab)/limits/RefusedFile';
import type { EquipmentRecord } from '@/schemas/bench';
import type { SweepFileView } from '@/schemas/sweepFile';
import type { FactorTablePreview } from '@/schemas/tables';

interface Props {
  file: SweepFileView;
  refusal: NonNullable<FactorTablePreview['refusal']>;
  item: EquipmentRecord;
  onDiscard: () => void;
}

/** A file that is no factor table: the line, what stands there, what was expected. Nothing is entered. */
export function RefusedTable({ file, refusal, item, onDiscard }: Props) {
  return (
    <RefusedFile
      what={`a factor table of ${item.identifier}`}
      file={file}
      refusal={refusal}
      ways={[
        'Correct that line in the file, or export the table again with a row per frequency, and drop the new copy.',
        'Copy the rows out of the certificate into a file with two columns: frequency with its unit in the heading, and dB or dB/m.',
      ]}
      onDiscard={onDiscard}
    >
      <FilePreview recognition={{ ...file.recognition, refusal }} wrongLine={refusal.line} />
    </RefusedFile>
  );
}
