'use client';

import { useRouter, useSearchParams } from 'next/navigation';
import { useState } from 'react';
import { FileDrop } from '@/components/forms/FileDrop';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import type { SweepFileView } from '@/schemas/sweepFile';
import type { EnteredFactorTables } from '@/schemas/tables';
import { EnteredSheet } from './EnteredSheet';
import type { UploadFor } from './tableDraft';
import { TableSheet } from './TableSheet';

/** A factor table on its way in: dropped, looked at beside the revision before, entered. */
export function TableUpload({ held, ...about }: UploadFor & { held: SweepFileView | null }) {
  const [known, setKnown] = useState(held);
  const [entered, setEntered] = useState<EnteredFactorTables | null>(null);
  const router = useRouter();
  const named = useSearchParams().get('file');
  const { item } = about;
  // The address decides, so that back and forward show what it names.
  const file = known?.id === named ? known : null;

  if (entered) return <EnteredSheet entered={entered} item={item} />;
  if (!file)
    return (
      <Sheet
        header={
          <SheetHeader
            title={`Upload a factor table of ${item.identifier}`}
            identity={<span>{item.description}</span>}
            finding={{ verdict: 'not-covered', children: 'Nothing is read yet. No revision is ever replaced.' }}
            actions={
              <ButtonLink kind="quiet" href={`/equipment/${item.id}`}>
                Leave it
              </ButtonLink>
            }
          />
        }
      >
        <FileDrop
          heading="Drop a factor table anywhere on this sheet"
          mostBytes={8_000_000}
          onFile={(next) => {
            setKnown(next);
            window.history.pushState(null, '', `/equipment/${item.id}/upload?file=${next.id}`);
          }}
        >
          <p>
            Antenna factor, loss of a cable or limiter, gain, AMN or AAN voltage division, transfer impedance of a
            current probe, loop or clamp factor: a row per frequency with its decibels, or S21 of a two-port file. What
            the file does not say is asked before anything is entered.
          </p>
        </FileDrop>
      </Sheet>
    );
  return (
    <TableSheet
      key={file.id}
      file={file}
      onDiscard={() => router.replace(`/equipment/${item.id}/upload`)}
      onEntered={setEntered}
      {...about}
    />
  );
}
