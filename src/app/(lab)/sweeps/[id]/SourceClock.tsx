import type { SourcesView } from '@/schemas/sources';
import { formatBandwidth } from '@/format/frequencies';
import { chanceText, emissionText, untellingText } from './sourceWords';

type Clock = SourcesView['clocks'][number];

/** Whose harmonics the chart shows, and how to choose. */
export interface Drawing {
  clockHz: number | null;
  onClock: (clockHz: number | null) => void;
}

const SHOWN = 12;

/** One declared clock or converter: the emissions on its harmonics, and what that is worth. */
export function SourceClock({
  clock,
  names,
  drawing,
}: {
  clock: Clock;
  names: ReadonlyMap<string, Clock>;
  drawing: Drawing;
}) {
  const { name, kind, frequencyHz, harmonics, untelling } = clock;
  const doubts = [chanceText(harmonics), untellingText(untelling)].filter(Boolean).join(' ');
  return (
    <div className="source">
      <h3>
        {name}
        {kind === 'converter' && !/converter/i.test(name) && ', converter'}
      </h3>
      <DrawButton frequencyHz={frequencyHz} drawing={drawing} />
      {harmonics.length > 0 && (
        <ul>
          {harmonics.slice(0, SHOWN).map(({ rank, harmonic, also, ...emission }) => (
            <li key={rank} className="source-line">
              <span className="t-figure">×{harmonic}</span>
              <span className="t-figure">{emissionText({ rank, ...emission })}</span>
              {also.length > 0 && (
                <span className="column-quiet source-also">or {also.map((id) => names.get(id)!.name).join(', ')}</span>
              )}
            </li>
          ))}
        </ul>
      )}
      {harmonics.length > SHOWN && <p className="column-quiet">and {harmonics.length - SHOWN} more</p>}
      {harmonics.length === 0 && untelling === 0 && <p className="column-quiet">No emission lies on its harmonics.</p>}
      {doubts && <p className="column-quiet">{doubts}</p>}
    </div>
  );
}

/** Draws the harmonics along the chart's lower edge; pressed again it takes them away. */
export function DrawButton({ frequencyHz, drawing }: { frequencyHz: number; drawing: Drawing }) {
  const drawn = drawing.clockHz === frequencyHz;
  return (
    <button
      type="button"
      className="source-draw"
      aria-pressed={drawn}
      onClick={() => drawing.onClock(drawn ? null : frequencyHz)}
    >
      {drawn ? 'Drawn: harmonics' : 'Draw harmonics'} of {formatBandwidth(frequencyHz)}
    </button>
  );
}
