import type { ReactNode } from 'react';
import { climateText, STAYED_WORDS, supplyText } from '@/format/setup';
import type { SetupRecordView } from '@/schemas/setup';

/** What is said, and nothing of what is not. */
export function SetUpFacts({ record }: { record: SetupRecordView }) {
  const facts: [string, ReactNode][] = [
    ['Mode', record.operatingMode],
    ['Supply', supplyText(record)],
    ['Cables', record.cableLayout],
    ['Ancillary', record.ancillary],
    ['Climate', climateText(record)],
    ['Deviations', record.deviations],
    ['EUT', record.eutStayed && (record.whatHappened ?? STAYED_WORDS[record.eutStayed])],
  ];
  return (
    <dl className="column-pair">
      {facts
        .filter(([, said]) => said)
        .map(([name, said]) => (
          <Fact key={name} name={name}>
            {said}
          </Fact>
        ))}
    </dl>
  );
}

function Fact({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt>{name}</dt>
      <dd className="min-w-0 whitespace-pre-line [overflow-wrap:anywhere]">{children}</dd>
    </>
  );
}
