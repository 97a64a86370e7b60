import { matchEmissions, type TracePair } from '@/emc/difference';
import { isOneEmission, type Place } from '@/emc/emissions';
import type { LineDetector } from '@/emc/kinds';
import { limitOf, prepareLine } from '@/emc/limitLine';
import { hangTrace, judgeSegment } from '@/emc/segment';
import { POINT } from '@/emc/correction';
import { severity } from '@/emc/verdict';
import { EvaluationCandidate } from '@/models/evaluationCandidate';
import { readPieces, type StoredPiece } from '@/models/traceStore';
import type { ComparedEmission } from '@/schemas/comparison';
import type { Side } from './comparedRuns';

/** Candidates beyond these of a run are not looked at; a list of thousands is no comparison. */
const COMPARED = 50;

type Sighting = NonNullable<ComparedEmission['a']>;
type Seen = Place & { candidate: EvaluationCandidate };

/**
 * What became of each emission: the candidates of both runs, those within the spacing of each other as one. Where one
 * run does not list what the other does, its highest point within the spacing stands for it, without a verdict.
 */
export async function emissionsOf(a: Side, b: Side, pairs: readonly TracePair[]): Promise<ComparedEmission[]> {
  const [listA, listB] = [await candidatesOf(a), await candidatesOf(b)];
  const [nearA, nearB] = [highestNear(a), highestNear(b)];
  const emissions: Omit<ComparedEmission, 'rank'>[] = [];
  for (const [at, pair] of pairs.entries()) {
    for (const limit of ['quasi-peak', 'average', 'peak'] as const) {
      const [seenA, seenB] = [seen(a, listA, pair.a, limit), seen(b, listB, pair.b, limit)];
      for (const match of matchEmissions(seenA, seenB)) {
        const one = match.a === null ? null : seenA[match.a]!;
        const other = match.b === null ? null : seenB[match.b]!;
        const place = (other ?? one)!;
        const sightA = one ? listed(one) : await nearA(pair.a, limit, place);
        const sightB = other ? listed(other) : await nearB(pair.b, limit, place);
        const { kind, fromHz, toHz, candidate } = place;
        emissions.push({
          ...{ kind, fromHz, toHz, frequencyHz: candidate.frequencyHz, pair: at, limit, a: sightA, b: sightB },
          movedDb: moved(kind, sightA, sightB),
        });
      }
    }
  }
  return emissions.sort(worseFirst).map((emission, i) => ({ rank: i + 1, ...emission }));
}

async function candidatesOf({ run }: Side): Promise<EvaluationCandidate[]> {
  const where = { evaluationId: run.evaluation.id };
  return EvaluationCandidate.findAll({ where, order: [['rank', 'ASC']], limit: COMPARED });
}

/** The candidates of one trace against the limits for one detector, as places. */
function seen(side: Side, list: readonly EvaluationCandidate[], trace: number, limit: LineDetector): Seen[] {
  const head = side.context.heads.find(({ index }) => index === trace)!;
  return list.flatMap((candidate) => {
    const line = side.context.lines.find(({ id }) => id === candidate.lineId);
    if (candidate.traceIndex !== trace || line?.detector !== limit) return [];
    const { kind, fromHz, toHz } = candidate;
    return [{ kind, fromHz, toHz, bandwidthHz: head.rbwHz ?? line.bandwidthHz, candidate }];
  });
}

function listed({ candidate }: Seen): Sighting {
  const { frequencyHz, level, marginDb, uncertaintyDb, verdict } = candidate;
  return { frequencyHz, level, marginDb, uncertaintyDb, verdict };
}

type Reader = (trace: number, limit: LineDetector, place: Place) => Promise<Sighting | null>;

/** Finds the highest of a trace's points within the spacing of a place, judged as the run is; null where it has none. */
function highestNear({ run, context }: Side): Reader {
  const { terms, lines } = context.judged;
  // Read when the first emission asks for them, and then kept for the others.
  let pieces: Promise<Ranged[]> | null = null;
  return async (trace, limit, place) => {
    const head = context.heads.find(({ index }) => index === trace)!;
    const bandwidthHz = head.rbwHz ?? place.bandwidthHz;
    pieces ??= readPieces(run.id).then((stored) => stored.map(ranged));
    const slackHz = (bandwidthHz + place.bandwidthHz) / 2;
    const near = (await pieces).filter(
      ({ lowHz, highHz }) => highHz >= place.fromHz - slackHz && lowHz <= place.toHz + slackHz,
    );
    const hung = hangTrace(head, terms, []);
    let highest: { frequencyHz: number; level: number } | null = null;
    for (const { piece } of near) {
      const at = (hz: number): Place => ({ kind: place.kind, fromHz: hz, toHz: hz, bandwidthHz });
      const points = [...piece.frequencyHz.keys()].filter((i) => isOneEmission(at(piece.frequencyHz[i]!), place));
      const frequencyHz = Float64Array.from(points, (i) => piece.frequencyHz[i]!);
      const reading = Float32Array.from(points, (i) => piece.levels.get(trace)![i]!);
      const { level, state } = judgeSegment(hung, frequencyHz, reading);
      for (let i = 0; i < points.length; i++) {
        if (state[i] !== POINT.known || (highest && highest.level >= level[i]!)) continue;
        highest = { frequencyHz: frequencyHz[i]!, level: level[i]! };
      }
    }
    if (!highest) return null;
    const { frequencyHz, level } = highest;
    const there = lines
      .filter(({ detector }) => detector === limit)
      .flatMap((line) => limitOf(prepareLine(line), frequencyHz) ?? []);
    const marginDb = there.length > 0 ? Math.min(...there) - level : null;
    return { frequencyHz, level, marginDb, uncertaintyDb: null, verdict: null };
  };
}

interface Ranged {
  piece: StoredPiece;
  lowHz: number;
  highHz: number;
}

function ranged(piece: StoredPiece): Ranged {
  let [lowHz, highHz] = [Infinity, -Infinity];
  for (const hz of piece.frequencyHz) {
    lowHz = Math.min(lowHz, hz);
    highHz = Math.max(highHz, hz);
  }
  return { piece, lowHz, highHz };
}

function moved(kind: Place['kind'], a: Sighting | null, b: Sighting | null): number | null {
  if (!a || !b) return null;
  if (kind === 'peak') return b.level - a.level;
  return a.marginDb === null || b.marginDb === null ? null : a.marginDb - b.marginDb;
}

/** As b stands, and where b lists nothing as a does; then by margin and frequency. */
function worseFirst(one: Omit<ComparedEmission, 'rank'>, other: Omit<ComparedEmission, 'rank'>): number {
  const ground = ({ a, b }: Omit<ComparedEmission, 'rank'>) => (b?.verdict ? b : (a ?? b));
  const rank = (emission: Omit<ComparedEmission, 'rank'>) => {
    const verdict = ground(emission)?.verdict;
    return [emission.b?.verdict ? 0 : 1, verdict ? severity(verdict) : 9, ground(emission)?.marginDb ?? Infinity];
  };
  const [some, others] = [rank(one), rank(other)];
  const at = some.findIndex((value, i) => value !== others[i]);
  return at < 0 ? one.frequencyHz - other.frequencyHz || one.pair - other.pair : some[at]! - others[at]!;
}
