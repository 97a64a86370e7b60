import { authorise, type Actor } from '@/auth/actor';
import type { DeclaredClock, SeenEmission } from '@/emc/clockHarmonics';
import { groupEmissions, type Emission, type Sighting } from '@/emc/emissions';
import type { LikelySources } from '@/emc/likelySources';
import type { SwitchingConverter } from '@/emc/sidebands';
import { EvaluationCandidate } from '@/models/evaluationCandidate';
import type { ProductClock } from '@/models/productClock';
import { unitOfWork } from '@/models/unitOfWork';
import type { SeenEmissionView, SourcesView } from '@/schemas/sources';
import { declaredClocks } from './clocks';
import { sourcesApart } from './importWorkers';
import { linesOf } from './limitSets';
import { findRun, type Run } from './runs';

/** The worst emissions are what somebody wants to know of; the search grows with their number. */
const MOST_EMISSIONS = 60;
/** Candidates that are read to make emissions of: one emission may be a candidate of several traces and lines. */
const MOST_CANDIDATES = 600;

type Seen = Emission<Sighting & SeenEmissionView & { levelDb: number }>;

/**
 * Where the emissions of a run may come from, by frequency: harmonics of what its product is declared to run at now,
 * sidebands, and families nobody declared. It decides nothing; a probe at the board does. The search for families runs
 * on a worker's thread where it is long.
 */
export async function readLikelySources(actor: Actor | null, publicId: string): Promise<SourcesView> {
  authorise(actor, 'sweep.read');
  const { emissions, clocks, product } = await unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    const { product } = run.state.sample.job;
    return { product, emissions: await emissionsOf(run), clocks: await declaredClocks(product.id) };
  });
  const looked = [...emissions].sort((a, b) => a.sightings[0]!.rank - b.sightings[0]!.rank).slice(0, MOST_EMISSIONS);
  const seen = looked.map(({ bandwidthHz, sightings }): SeenEmission => {
    const { frequencyHz, levelDb, marginDb } = sightings[0]!;
    return { frequencyHz, bandwidthHz, levelDb, marginDb };
  });
  const converters = clocks.filter(({ kind }) => kind === 'converter').map(converterOf);
  const found = await sourcesApart(actor.userId, { emissions: seen, clocks: clocks.map(clockOf), converters });
  return { productId: product.publicId, total: emissions.length, ...view(looked, clocks, found) };
}

/** Candidates of the current evaluation as emissions, each at its worst; a reading lies within RBW or step. */
async function emissionsOf(run: Run): Promise<Seen[]> {
  const lines = (await linesOf([run.limitSet])).get(run.limitSet.id)!;
  const rows = await EvaluationCandidate.findAll({
    where: { evaluationId: run.evaluation.id, kind: 'peak' },
    order: [['rank', 'ASC']],
    limit: MOST_CANDIDATES,
  });
  const stepHz = Math.abs(run.stepHz ?? 0);
  return groupEmissions(
    rows.map(({ kind, rank, traceIndex, lineId, frequencyHz, level, marginDb, verdict }) => {
      const trace = run.reading.traces.find(({ index }) => index === traceIndex);
      const rbwHz = trace?.rbwHz ?? lines.find(({ id }) => id === lineId)!.bandwidthHz;
      const bandwidthHz = Math.max(rbwHz, stepHz);
      return {
        kind,
        fromHz: frequencyHz,
        toHz: frequencyHz,
        bandwidthHz,
        rank,
        frequencyHz,
        levelDb: level,
        marginDb,
        verdict,
      };
    }),
  );
}

/** The core tells clocks apart by name, so it is given their ids. */
function clockOf({ publicId, frequencyHz, tolerancePpm, spreadKind, spreadPct }: ProductClock): DeclaredClock {
  const wholePpm = (spreadPct ?? 0) * 1e4;
  const spread =
    spreadKind === 'down' ? { belowPpm: wholePpm, abovePpm: 0 } : { belowPpm: wholePpm / 2, abovePpm: wholePpm / 2 };
  return { name: publicId, fundamentalHz: frequencyHz, tolerancePpm, ...(spreadKind && { spread }) };
}

function converterOf({ publicId, frequencyHz, tolerancePpm, spreadPct }: ProductClock): SwitchingConverter {
  return { name: publicId, frequencyHz, tolerancePpm: tolerancePpm + (spreadPct ?? 0) * 1e4 };
}

function view(
  looked: readonly Seen[],
  clocks: readonly ProductClock[],
  found: LikelySources,
): Omit<SourcesView, 'productId' | 'total'> {
  const at = (i: number): SeenEmissionView => {
    const { rank, frequencyHz, marginDb } = looked[i]!.sightings[0]!;
    return { rank, frequencyHz, marginDb };
  };
  const ascending = (a: SeenEmissionView, b: SeenEmissionView) => a.frequencyHz - b.frequencyHz;
  const explains = ({ harmonics, sidebands, families }: LikelySources['emissions'][number]) =>
    harmonics.length > 0 || sidebands.some(({ mirrored }) => mirrored) || families.length > 0;
  const unexplained = found.emissions.flatMap((source, i) => (explains(source) ? [] : [at(i)]));
  return {
    looked: looked.length,
    explained: looked.length - unexplained.length,
    clocks: clocks.map(({ publicId: id, name, kind, frequencyHz }) => ({
      id,
      name,
      kind,
      frequencyHz,
      harmonics: found.emissions
        .flatMap(({ harmonics }, i) =>
          harmonics
            .filter(({ clock }) => clock === id)
            .map(({ harmonic, offsetHz, byChance }) => {
              const also = harmonics.map(({ clock }) => clock).filter((other) => other !== id);
              return { ...at(i), harmonic, offsetHz, byChance, also };
            }),
        )
        .sort(ascending),
      untelling: found.emissions.filter(({ untelling }) => untelling.some(({ clock }) => clock === id)).length,
    })),
    // The likeliest carrier of each.
    sidebands: found.emissions
      .flatMap(({ sidebands }, i) =>
        sidebands.slice(0, 1).map(({ converter, carrier, order, mirrored }) => {
          return { ...at(i), converterId: converter, carrier: at(carrier), order, mirrored };
        }),
      )
      .sort(ascending),
    families: found.families.map(({ members, ...family }) => ({
      ...family,
      members: members.map(({ emission, harmonic }) => ({ ...at(emission), harmonic })),
    })),
    unexplained,
  };
}
