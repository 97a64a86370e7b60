'use client';

import { CorrectForm } from '@/app/(lab)/jobs/CorrectForm';
import { InPlace } from '@/app/(lab)/jobs/InPlace';
import { EmptyLine } from '@/components/ui/EmptyLine';
import { SectionHeading } from '@/components/ui/SectionHeading';
import { formatDay } from '@/format/dates';
import type { ClockView } from '@/schemas/clock';
import { clockFrequency, KIND_WORDS, toleranceText } from './clockDraft';
import { ClockForm } from './ClockForm';
import { CLOCK_WRITES } from './clockWrites';
import './clocks.css';

/** What the product is declared to run at: its emissions are compared with it on every run sheet. */
export function Clocks({ productId, clocks, zone }: { productId: string; clocks: readonly ClockView[]; zone: string }) {
  const declared = clocks.filter(({ withdrawn }) => !withdrawn).sort((a, b) => a.frequencyHz - b.frequencyHz);
  const withdrawn = clocks.filter((clock) => clock.withdrawn);
  return (
    <section aria-labelledby="clocks">
      <SectionHeading id="clocks" className="mt-6" remark={declared.length > 0 && 'emissions are compared with them'}>
        Clocks and converters
      </SectionHeading>
      {declared.length === 0 ? (
        <EmptyLine lead="Nothing is declared yet.">
          Declare what it runs at, and each run sheet says which emissions lie on the harmonics.
        </EmptyLine>
      ) : (
        <ul className="clock-list">
          {declared.map((clock) => (
            <Clock key={clock.id} clock={clock} productId={productId} zone={zone} />
          ))}
        </ul>
      )}
      <div className="mt-2">
        <InPlace
          acts={[
            {
              id: 'declare',
              word: 'Declare a clock',
              form: (close) => <ClockForm productId={productId} onClose={close} />,
            },
          ]}
        />
      </div>
      {withdrawn.length > 0 && (
        <ul className="t-detail mt-3">
          {withdrawn.map((clock) => (
            <li key={clock.id}>
              {clock.name}, <span className="t-figure">{clockFrequency(clock.frequencyHz)}</span>: withdrawn{' '}
              {formatDay(clock.withdrawn!.at, zone)} by {clock.withdrawn!.by.name}, {clock.withdrawn!.reason}
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}

function Clock({ clock, productId, zone }: { clock: ClockView; productId: string; zone: string }) {
  const { id, version, name, kind, frequencyHz, note, by, at } = clock;
  return (
    <li className="clock">
      <span className="t-figure clock-frequency">{clockFrequency(frequencyHz)}</span>
      <span className="min-w-0">
        <b>{name}</b>
        {!name.toLowerCase().includes(KIND_WORDS[kind]) && `, ${KIND_WORDS[kind]}`},{' '}
        <span className="t-figure">{toleranceText(clock)}</span>
        <span className="t-detail block">
          {note && `${note}; `}declared by {by.name}, {formatDay(at, zone)}
        </span>
      </span>
      <div className="clock-acts">
        <InPlace
          size="table"
          acts={[
            {
              id: 'correct',
              word: 'Correct',
              kind: 'quiet',
              form: (close) => <ClockForm productId={productId} clock={clock} onClose={close} />,
            },
            {
              id: 'withdraw',
              word: 'Withdraw',
              kind: 'quiet',
              form: (close) => (
                <CorrectForm
                  what="clock"
                  operation={CLOCK_WRITES.withdrawProductClock}
                  id={id}
                  version={version}
                  fixed={{}}
                  fields={[{ name: 'reason', label: 'Reason', value: '' }]}
                  act={`Withdraw ${name}`}
                  done={`${name} is withdrawn`}
                  onClose={close}
                />
              ),
            },
          ]}
        />
      </div>
    </li>
  );
}
