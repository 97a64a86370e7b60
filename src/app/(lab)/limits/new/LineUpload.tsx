'use client';

import { useRouter, useSearchParams } from 'next/navigation';
import { useState } from 'react';
import { FileDrop } from '@/components/forms/FileDrop';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { ButtonLink } from '@/components/ui/Button';
import type { SweepFileView } from '@/schemas/sweepFile';
import type { EnteredLimitLine } from '@/schemas/tables';
import { EnteredLine } from './EnteredLine';
import type { LineUploadFor } from './lineDraft';
import { LineSheet } from './LineSheet';

/** A limit line on its way in: dropped, looked at beside the revision before, entered. */
export function LineUpload({ held, ...about }: LineUploadFor & { held: SweepFileView | null }) {
  const [known, setKnown] = useState(held);
  const [entered, setEntered] = useState<EnteredLimitLine | null>(null);
  const router = useRouter();
  const named = useSearchParams().get('file');
  const file = known?.id === named ? known : null;
  const before = about.lines.find(({ id }) => id === about.revises) ?? null;
  const query = about.revises ? `revises=${about.revises}` : '';

  if (entered) return <EnteredLine entered={entered} />;
  if (file)
    return (
      <LineSheet
        key={file.id}
        file={file}
        onDiscard={() => router.replace(`/limits/new${query && `?${query}`}`)}
        onEntered={setEntered}
        {...about}
      />
    );
  return (
    <Sheet
      header={
        <SheetHeader
          title={before ? `Upload revision ${before.revision + 1} of a limit line` : 'Upload a limit line'}
          identity={before && <span>{before.name}</span>}
          finding={{ verdict: 'not-covered', children: 'Nothing is read yet. No revision is ever replaced.' }}
          actions={
            <ButtonLink kind="quiet" href={before ? `/limits/${before.id}` : '/limits'}>
              Leave it
            </ButtonLink>
          }
        />
      }
    >
      <FileDrop
        heading="Drop a limit line anywhere on this sheet"
        mostBytes={1_000_000}
        onFile={(next) => {
          setKnown(next);
          window.history.pushState(null, '', `/limits/new?file=${next.id}${query && `&${query}`}`);
        }}
      >
        <p>One line per file, as text or CSV. Either a row per segment:</p>
        <pre className="t-figure my-1.5 text-[0.8125rem] whitespace-pre-wrap">{SEGMENTS}</pre>
        <p>or a row per break point, where a repeated frequency is a step:</p>
        <pre className="t-figure my-1.5 text-[0.8125rem] whitespace-pre-wrap">{POINTS}</pre>
        <p>Decimal comma or point, semicolons, tabs or commas between. What the file does not say is asked.</p>
      </FileDrop>
    </Sheet>
  );
}

const SEGMENTS = `Start (MHz);Stop (MHz);Limit at start (dBuV);Limit at stop (dBuV)
0.15;0.5;66;56
0.5;5;56;56`;
const POINTS = `Frequency (MHz);Limit (dBuV/m)
30;40
230;40
230;47
1000;47`;
