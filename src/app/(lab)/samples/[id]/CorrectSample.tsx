'use client';

import { CorrectForm } from '@/app/(lab)/jobs/CorrectForm';
import { InPlace } from '@/app/(lab)/jobs/InPlace';
import { WRITES } from '@/app/(lab)/jobs/writes';
import type { SampleView } from '@/schemas/job';

export function CorrectSample({ sample }: { sample: SampleView }) {
  const { id, version, code, serial, firmware, description } = sample;
  return (
    <div className="mt-2">
      <InPlace
        acts={[
          {
            id: 'correct',
            word: 'Correct serial, firmware or description',
            form: (close) => (
              <CorrectForm
                what="sample"
                operation={WRITES.changeSample}
                id={id}
                version={version}
                fields={[
                  { name: 'serial', label: 'Serial number', value: serial },
                  { name: 'firmware', label: 'Firmware', value: firmware },
                  { name: 'description', label: 'What came with it', value: description, area: true },
                ]}
                act="Save the correction"
                done={`${code} is corrected`}
                onClose={close}
              />
            ),
          },
        ]}
      />
    </div>
  );
}
