'use client';

import type { ComponentProps } from 'react';
import { CorrectForm } from './CorrectForm';
import { InPlace } from './InPlace';

type Props = Omit<ComponentProps<typeof CorrectForm>, 'act' | 'onClose'> & {
  /** On the button that opens the form: `Correct serial, firmware or description`. */
  word: string;
};

/** A record's own fields behind one button. */
export function CorrectInPlace({ word, ...form }: Props) {
  return (
    <div className="mt-2">
      <InPlace
        acts={[
          {
            id: 'correct',
            word,
            form: (close) => <CorrectForm {...form} act="Save the correction" onClose={close} />,
          },
        ]}
      />
    </div>
  );
}
