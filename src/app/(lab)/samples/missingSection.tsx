import { SetUpsOfPort } from '@/app/(lab)/sweeps/[id]/SetUpsOfPort';
import { VerdictWord } from '@/components/ui/VerdictWord';
import { capitalised, PORT_WORDS } from '@/format/words';
import type { Standing } from './standing';

/** The part of the margin that says, port by port, what its verdict still lacks. */
export function missingSection(standings: readonly Standing[]) {
  if (standings.length === 0) return [];
  const lacking = standings.filter(({ missing }) => missing.length > 0);
  return [
    {
      id: 'ports',
      title: 'Ports',
      children: (
        <ul>
          {standings.map(({ port, state, verdict, missing, sweep }) => (
            <li key={port}>
              <span className="column-line">
                <span>
                  {capitalised(PORT_WORDS[port])} in {state}
                </span>
                <VerdictWord verdict={verdict} />
              </span>
              {missing.slice(0, 4).map((sentence) => (
                <span key={sentence} className="column-quiet block">
                  {sentence}
                </span>
              ))}
              {missing.length > 4 && (
                <span className="column-quiet block">And {missing.length - 4} more, on its sweep sheet.</span>
              )}
              <SetUpsOfPort runs={sweep.portVerdict.runs} />
            </li>
          ))}
          {lacking.length === 0 && <li className="column-quiet">Nothing is missing for these verdicts.</li>}
        </ul>
      ),
    },
  ];
}

/** The same in one line, for the closed drawer of a phone; null while nothing is measured. */
export function missingLine(standings: readonly Standing[]): string | null {
  if (standings.length === 0) return null;
  return standings.flatMap(({ missing }) => missing)[0] ?? 'Nothing is missing for these verdicts.';
}
