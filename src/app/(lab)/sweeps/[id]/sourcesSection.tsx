import Link from 'next/link';
import type { MarginSection } from '@/components/shell/marginSection';
import type { SourcesView } from '@/schemas/sources';
import { capitalised, countInWords } from '@/format/words';
import { SourceClock, type Drawing } from './SourceClock';
import { SourceFamilies } from './SourceFamilies';
import { emissionText, sidebandText, sourcesSummary } from './sourceWords';
import type { Sources } from './useSources';
import './sources.css';

/** Where the run's emissions may come from, with a way to draw the harmonics of each. */
export function sourcesSection(sources: Sources, drawing: Drawing): MarginSection {
  const found = sources !== 'looking' && 'view' in sources ? sources.view : null;
  return {
    id: 'sources',
    title: 'Likely sources',
    summary: found ? sourcesSummary(found) : sources === 'looking' ? 'looking' : 'not known',
    children: (
      <div aria-busy={sources === 'looking'}>
        {found ? (
          <LikelySources sources={found} drawing={drawing} />
        ) : sources === 'looking' || !('problem' in sources) ? (
          <p className="column-quiet">Comparing the emissions with what the product is declared to run at.</p>
        ) : (
          <p className="text-madder">
            {sources.problem.title} {sources.problem.detail}
          </p>
        )}
      </div>
    ),
  };
}

/** As many as fit beside the rest; the candidates table holds all. */
const SHOWN = 12;

export function LikelySources({ sources, drawing }: { sources: SourcesView; drawing: Drawing }) {
  const { productId, looked, total, clocks, families, sidebands, unexplained } = sources;
  const names = new Map(clocks.map((clock) => [clock.id, clock]));
  const mirrored = sidebands.filter((one) => one.mirrored);
  const single = sidebands.length - mirrored.length;
  return (
    <>
      {clocks.length === 0 && <p>Nothing is declared that this product runs at.</p>}
      {clocks.map((clock) => (
        <SourceClock key={clock.id} clock={clock} names={names} drawing={drawing} />
      ))}
      {sidebands.length > 0 && (
        <div className="source">
          <h3>Sidebands</h3>
          <ul>
            {mirrored.map((one) => (
              <li key={one.rank}>
                <span className="t-figure">{emissionText(one)}</span>
                <span className="column-quiet block">
                  {sidebandText(one, names.get(one.converterId)!.frequencyHz)} ({names.get(one.converterId)!.name}), its
                  mirror image too
                </span>
              </li>
            ))}
          </ul>
          {single > 0 && (
            <p className="column-quiet">
              {capitalised(countInWords(single))} {single === 1 ? 'lies' : 'lie'} beside a stronger one on one side
              alone, which explains nothing.
            </p>
          )}
        </div>
      )}
      <SourceFamilies families={families} drawing={drawing} />
      {unexplained.length > 0 && (
        <div className="source">
          <h3>Unexplained</h3>
          <ul>
            {unexplained.slice(0, SHOWN).map((one) => (
              <li key={one.rank} className="t-figure">
                {emissionText(one)}
              </li>
            ))}
          </ul>
          {unexplained.length > SHOWN && <p className="column-quiet">and {unexplained.length - SHOWN} more</p>}
        </div>
      )}
      {looked === 0 && <p>No emission stands clear of the floor, so there is nothing to place.</p>}
      <p className="column-quiet">
        {total > looked && `The worst ${looked} of ${total} emissions were looked at. `}
        By frequency alone: this is what can be. A probe at the board shows what is.
      </p>
      <p>
        <Link href={`/products/${productId}#clocks`} className="text-pen">
          {clocks.length === 0 ? 'Declare a clock' : 'What it is declared to run at'}
        </Link>
      </p>
    </>
  );
}
