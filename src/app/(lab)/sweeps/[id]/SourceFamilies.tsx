import type { SourcesView } from '@/schemas/sources';
import { capitalised, countInWords } from '@/format/words';
import { DrawButton, type Drawing } from './SourceClock';
import { emissionText, fundamentalText, oneIn } from './sourceWords';

const SHOWN = 12;

/** Harmonics of something nobody declared, found among what nothing declared explains. */
export function SourceFamilies({ families, drawing }: { families: SourcesView['families']; drawing: Drawing }) {
  return families.map((family) => (
    <div key={family.fundamentalHz} className="source">
      <h3>
        Not declared: <span className="t-figure">{fundamentalText(family)}</span>
      </h3>
      <p>
        {capitalised(countInWords(family.members.length))} emissions are whole multiples of it. Unrelated ones would
        show such a family in at most {oneIn(family.byChance)} spectra.
      </p>
      <DrawButton frequencyHz={family.fundamentalHz} drawing={drawing} />
      <ul>
        {family.members.slice(0, SHOWN).map(({ harmonic, ...emission }) => (
          <li key={emission.rank} className="source-line">
            <span className="t-figure">×{harmonic}</span>
            <span className="t-figure">{emissionText(emission)}</span>
          </li>
        ))}
      </ul>
      {family.members.length > SHOWN && <p className="column-quiet">and {family.members.length - SHOWN} more</p>}
    </div>
  ));
}
