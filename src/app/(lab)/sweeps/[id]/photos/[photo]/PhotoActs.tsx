'use client';

import { CorrectForm } from '@/app/(lab)/jobs/CorrectForm';
import { InPlace } from '@/app/(lab)/jobs/InPlace';
import type { PhotoView } from '@/schemas/setup';
import { SETUP_WRITES } from '../../setUpWrites';

/** What the lab may do with a photograph; nothing is deleted. */
export function PhotoActs({ photo: { id, version, caption } }: { photo: PhotoView }) {
  const shared = { what: 'photograph', id, version };
  return (
    <div className="mt-4">
      <InPlace
        acts={[
          {
            id: 'caption',
            word: 'Correct the caption',
            form: (close) => (
              <CorrectForm
                {...shared}
                operation={SETUP_WRITES.changePhoto}
                fields={[{ name: 'caption', label: 'Caption', value: caption }]}
                act="Save the caption"
                done="Caption saved"
                onClose={close}
              />
            ),
          },
          {
            id: 'withdraw',
            word: 'Withdraw',
            form: (close) => (
              <CorrectForm
                {...shared}
                operation={SETUP_WRITES.withdrawPhoto}
                fixed={{}}
                fields={[
                  {
                    name: 'reason',
                    label: 'Reason',
                    value: '',
                    hint: 'The client does not see it any more; the lab does, with this reason.',
                  },
                ]}
                act="Withdraw the photograph"
                done="Photograph withdrawn"
                onClose={close}
              />
            ),
          },
        ]}
      />
    </div>
  );
}
