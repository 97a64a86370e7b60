'use client';

import { CorrectInPlace } from '@/app/(lab)/jobs/CorrectInPlace';
import { WRITES } from '@/app/(lab)/jobs/writes';
import type { SampleView } from '@/schemas/job';

export function CorrectSample({ sample }: { sample: SampleView }) {
  const { id, version, code, serial, firmware, description } = sample;
  return (
    <CorrectInPlace
      word="Correct serial, firmware or description"
      what="sample"
      operation={WRITES.changeSample}
      id={id}
      version={version}
      fields={[
        { name: 'serial', label: 'Serial number', value: serial },
        { name: 'firmware', label: 'Firmware', value: firmware },
        { name: 'description', label: 'What came with it', value: description, area: true },
      ]}
      done={`${code} is corrected`}
    />
  );
}
