import { groupEmissions, type Emission, type Place, type Sighting } from '@/emc/emissions';
import type { Port } from '@/emc/kinds';
import { positionsOf } from '@/emc/port';
import { positionOf, sweptBy, voicesOf, type RetestPosition } from '@/emc/retests';
import { judgeEmission, type Judgement } from '@/emc/retestStatus';
import { sameEmissions } from '@/emc/sameEmissions';
import type { Retest } from '@/models/retest';
import type { LoadedReading, LoadedRun } from './retestRuns';
import { positionWords, standingSentence } from './retestSentences';
import { factsOf, NOTHING_READ, readingFacts, shownReading, type RetestFacts } from './retestFacts';

/** An item as the runs want it to be. */
export interface Wanted {
  /** The item it is; null for a new one. */
  row: Retest | null;
  facts: RetestFacts;
  status: Judgement<LoadedReading>['status'];
  /** Why, as the item says it; `gone` is explained by what happened. */
  says: string;
  /** The run that decided. */
  runId: number | null;
}

export interface Queue {
  port: Port;
  /** M1 */
  label: string;
  /** Runs that speak for this state. */
  runs: readonly LoadedRun[];
  /** Runs that speak for the states before it. */
  earlier: readonly LoadedRun[];
  /** Items of the state before that are carried to this one, with that state's label. */
  carried: readonly Retest[];
  from: string | null;
  /** The items this state has. */
  rows: readonly Retest[];
}

type Seen = Sighting & { reading?: LoadedReading; row?: Retest; carried: boolean };

/**
 * Every item that a state's runs, and what was carried to it, ask for; and each it has that nothing asks for now. In
 * turns, since a noisy prescan can leave thousands open.
 */
export function* wantedItems(queue: Queue): Generator<void, Wanted[]> {
  const { port, runs, carried, rows } = queue;
  const readings = runs.flatMap((run) => run.readings);
  const asking = readings.filter(({ verdict }) => verdict === 'over' || verdict === 'needs-final');
  const keys = new Set([
    ...asking.map(({ lineId }) => lineId),
    ...[...carried, ...rows].flatMap(({ lineKey }) => lineKey ?? []),
  ]);
  const needed = neededLines(queue);
  const swept = (lineKey: string) =>
    carried.length === 0 ? null : (position: RetestPosition) => sweptBy(port, runs, position, [lineKey]) !== null;
  const emissions: Wanted[] = [];
  for (const lineKey of [...keys].sort()) {
    const seen: Seen[] = [
      ...asking.filter(({ lineId }) => lineId === lineKey).map((reading) => ({ ...reading, reading, carried: false })),
      ...carried.filter((row) => row.lineKey === lineKey).map((row) => ({ ...sightingOf(row), row, carried: true })),
    ];
    emissions.push(...(yield* ofOneLine(queue, lineKey, seen, swept(lineKey))));
  }
  return [...emissions, ...repeats(queue, needed)];
}

function placeOf(row: Retest): Place {
  const kind = row.kind === 'floor' ? 'floor' : 'peak';
  return { kind, fromHz: row.fromHz!, toHz: row.toHz!, bandwidthHz: row.spacingHz! };
}

function sightingOf(row: Retest): Sighting {
  return { ...placeOf(row), verdict: row.verdict ?? 'needs-final', marginDb: row.marginDb! };
}

function saying({ from }: Queue, judged: Judgement<LoadedReading>) {
  const { status, governing, unswept } = judged;
  const says = standingSentence(governing, { from, unswept, several: judged.stands.length > 1 });
  return { status, says, runId: governing.runs.at(-1)?.id ?? null };
}

/** Emissions judged before others get their turn. */
const PER_TURN = 50;

function* ofOneLine(
  queue: Queue,
  lineKey: string,
  seen: Seen[],
  swept: ((position: RetestPosition) => boolean) | null,
): Generator<void, Wanted[]> {
  const { port, runs } = queue;
  const rows = queue.rows.filter((row) => row.lineKey === lineKey);
  const known = rows.map(placeOf);
  const emissions = groupEmissions(seen);
  yield;
  const same = sameEmissions(known, emissions);
  yield;
  const voices = voicesOf(runs, lineKey, [...emissions, ...known]);
  const wanted: Wanted[] = [];
  for (const [i, emission] of emissions.entries()) {
    const row = same[i] === null ? null : rows[same[i]!]!;
    const positions = [...new Set(emission.sightings.flatMap((one) => positionsAsked(port, one)))].sort(byName);
    const judged = judgeEmission(voices, { port, place: emission, positions, claimed: true, swept });
    wanted.push(wantOf(queue, row, emission, positions, judged));
    if (i % PER_TURN === 0) yield;
  }
  const taken = new Set(same);
  for (const [i, row] of rows.entries()) {
    if (taken.has(i)) continue;
    const asked = { port, place: known[i]!, positions: row.positions, claimed: false, swept };
    const judged = judgeEmission(voices, asked);
    const { finalId } = judged;
    wanted.push({ row, facts: { ...factsOf(row), waitsAt: [], finalId, originId: null }, ...saying(queue, judged) });
    if (i % PER_TURN === 0) yield;
  }
  return wanted;
}

const byName = (a: RetestPosition, b: RetestPosition) => (String(a) < String(b) ? -1 : 1);

function positionsAsked(port: Port, { reading, row }: Seen): readonly RetestPosition[] {
  return reading ? [positionOf(port, reading.run)] : row!.positions;
}

function wantOf(
  queue: Queue,
  row: Retest | null,
  emission: Emission<Seen>,
  positions: RetestPosition[],
  judged: Judgement<LoadedReading>,
): Wanted {
  const own = emission.sightings.filter(({ carried }) => !carried);
  const [before] = emission.sightings.flatMap((one) => one.row ?? []);
  const { kind, fromHz, toHz, bandwidthHz: spacingHz } = emission;
  const reason = own.length > 0 ? (own[0]!.verdict === 'over' ? 'over' : 'needs-final') : before!.reason;
  const shown = shownReading(judged) ?? (before ? null : own[0]!.reading!);
  const read = shown ? readingFacts(queue.port, shown) : factsOf(before!);
  const facts = { ...read, kind, reason, positions, waitsAt: judged.waitsAt, fromHz, toHz, spacingHz };
  const ids = { finalId: judged.finalId, originId: before?.id ?? null };
  return { row, facts: { ...facts, ...ids }, ...saying(queue, judged) };
}

/** Every line the states before were compared with: a repeated prescan has to show all of them again. */
function neededLines({ earlier, carried }: Queue): string[] {
  const lines = earlier.flatMap((run) => run.lines.map(({ id }) => id));
  return [...new Set([...lines, ...carried.flatMap(({ lineKey }) => lineKey ?? [])])].sort();
}

/** A repeated prescan of each position while something is carried to this state. */
function repeats({ port, label, runs, earlier, carried, rows }: Queue, needed: readonly string[]): Wanted[] {
  const known = rows.filter(({ kind }) => kind === 'repeat-prescan');
  const positions = carried.length > 0 ? positionsOf(port, [...runs, ...earlier]).map(({ key }) => key) : [];
  const asked = positions.map((position): Wanted => {
    const run = sweptBy(port, runs, position, needed) as LoadedRun | null;
    const row = known.find((one) => one.position === position) ?? null;
    const says = run
      ? `prescan repeated in ${run.row.number}`
      : `${label} was fitted, so the prescan of ${positionWords(position)} is repeated before anything is cleared`;
    const kind = 'repeat-prescan' as const;
    const ids = { sweepId: run?.id ?? null };
    const facts = {
      ...NOTHING_READ,
      kind,
      reason: kind,
      position,
      positions: [position],
      waitsAt: run ? [] : [position],
      ...ids,
    };
    return { row, facts, status: run ? 'cleared' : 'waiting', says, runId: run?.id ?? null };
  });
  const left = known.filter(({ position }) => !positions.includes(position));
  const gone = (row: Retest): Wanted => ({ row, facts: factsOf(row), status: 'gone', says: '', runId: null });
  return [...asked, ...left.map(gone)];
}
