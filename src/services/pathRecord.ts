import { authorise, type Actor } from '@/auth/actor';
import { factorUnitOf, levelUnitAfter, signOf } from '@/emc/factorQuantity';
import type { FactorAt } from '@/emc/factorTable';
import { POLARISATIONS, type FactorQuantity, type Polarisation } from '@/emc/kinds';
import { correctionLines, correctionStretches, pathCorrectionAt, roundFrequencies } from '@/emc/pathCorrection';
import type { UncertaintyStep } from '@/emc/types';
import { NotFound } from '@/errors';
import { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import { unitOfWork } from '@/models/unitOfWork';
import type { User } from '@/models/user';
import type { CorrectionAt, CorrectionView, PathItemRecord, PathRecord } from '@/schemas/paths';
import { dayIn, labSettings } from './lab';
import { runsThrough } from './pathRuns';
import { itemView, loadPaths, termsOf, type LoadedItem, type LoadedPath } from './signalPaths';
import { PURPOSES_WITH_U, uncertaintyViews } from './uncertaintyBudget';

/** A path as it stands, or as one of its earlier revisions had it. */
export async function readPath(
  actor: Actor | null,
  publicId: string,
  { revision: wanted, atHz }: { revision?: number; atHz?: number } = {},
): Promise<PathRecord> {
  authorise(actor, 'path.list');
  return unitOfWork(async () => {
    const path = await SignalPath.findOne({ where: { publicId } });
    if (!path) throw new NotFound('signal path');
    const revisions = await SignalPathRevision.findAll({
      where: { signalPathId: path.id },
      include: ['user'],
      order: [['revision', 'DESC']],
    });
    const shown = wanted === undefined ? revisions[0] : revisions.find(({ revision }) => revision === wanted);
    if (!shown) throw new NotFound('revision of this signal path');
    const today = dayIn((await labSettings()).zone, new Date());
    const [loaded] = await loadPaths([shown], today);
    const corrections = correctionsOf(loaded!, atHz);
    const runs = await runsThrough(revisions);
    return {
      id: path.publicId,
      version: path.version,
      code: path.code,
      name: path.name,
      port: path.port,
      position: path.position,
      revision: shown.revision,
      distanceM: distanceOf(loaded!),
      unit: unitOf(loaded!),
      items: loaded!.items.map((item) => itemRecord(item, today)),
      corrections,
      uncertaintySource: shown.uncertaintySource,
      uncertainty: uncertaintyViews(shown, path.port),
      withoutUncertainty: withoutUncertainty(corrections, shown),
      revisions: revisions.map((row) => revisionView(row, runs.byRevision.get(row.id) ?? 0)),
      runs: { count: runs.count, latest: runs.latest },
    };
  });
}

const signMark = (quantity: FactorQuantity) => (signOf(quantity) < 0 ? ('−' as const) : ('+' as const));

/** Of its transducer: dB/m with an antenna factor, dB without any. */
function unitOf({ items }: LoadedPath): string {
  const quantities = items.flatMap(({ stored }) => stored.quantity ?? []);
  const transducer = quantities.find((quantity) => levelUnitAfter(quantity) !== null);
  return transducer ? factorUnitOf(transducer) : 'dB';
}

function revisionView(row: SignalPathRevision, runs: number): PathRecord['revisions'][number] {
  const { user } = row as SignalPathRevision & { user: User | null };
  const largest = (steps: readonly UncertaintyStep[]) =>
    steps.length === 0 ? null : Math.max(...steps.map(({ expandedDb }) => expandedDb));
  return {
    revision: row.revision,
    enteredAt: row.createdAt.toISOString(),
    enteredBy: user && { id: user.publicId, name: user.name },
    reason: row.reason,
    budget: row.budget !== null,
    uncertaintySource: row.uncertaintySource,
    prescanDb: largest(row.uncertainty.prescan),
    finalDb: largest(row.uncertainty.final),
    runs,
  };
}

function itemRecord(item: LoadedItem, today: string): PathItemRecord {
  const { stored, equipment, tables } = item;
  return {
    ...itemView(item, today),
    equipmentId: equipment.publicId,
    state: equipment.state,
    term: stored.term,
    sign: stored.term === null || stored.quantity === null ? null : signMark(stored.quantity),
    fromHz: stored.fromHz ?? null,
    toHz: stored.toHz ?? null,
    tables: tables.map((table) => ({
      id: table.publicId,
      name: table.name,
      revision: table.revision,
      quantity: table.quantity,
      polarisation: table.polarisation,
      distanceM: table.distanceM,
      source: table.source,
      frequencyHz: table.frequenciesHz,
      valueDb: table.valuesDb,
    })),
  };
}

/** Of the antenna factor, for one polarisation; `undefined` asks for any. */
function distanceOf({ items }: LoadedPath, polarisation?: Polarisation | null): number | null {
  const own = items.flatMap(({ tables, stored }) =>
    tables.filter(({ publicId }) => {
      if (polarisation === undefined || stored.tables.any !== null) return true;
      return polarisation !== null && stored.tables[polarisation] === publicId;
    }),
  );
  return own.map(({ distanceM }) => distanceM).find((m) => m !== null) ?? null;
}

/** One correction for each polarisation that a table differs by, otherwise one for both. */
function correctionsOf(path: LoadedPath, atHz?: number): CorrectionView[] {
  const adding = path.items.filter(({ stored }) => stored.term !== null);
  const differs = adding.some(({ stored }) => stored.tables.any === null);
  const polarisations: (Polarisation | null)[] = differs
    ? POLARISATIONS.filter((one) => adding.every(({ stored }) => stored.tables.any ?? stored.tables[one]))
    : [null];
  return polarisations.map((polarisation) => {
    const loaded = termsOf(path, { polarisation, distanceM: distanceOf(path, polarisation) }, new Map());
    const terms = loaded.map(({ term }) => term);
    const stretches = correctionStretches(terms);
    const known = stretches.filter(({ missing }) => missing.length === 0);
    const [first, last] = [known[0] ?? stretches[0], known.at(-1) ?? stretches.at(-1)];
    return {
      polarisation,
      terms: loaded.map(({ item, table, term }) => ({
        identifier: item.equipment.identifier,
        name: term.name,
        sign: signMark(table.quantity),
        tableId: table.publicId,
      })),
      lines: correctionLines(terms),
      stretches,
      at: withAsked(first && last ? roundFrequencies(first.fromHz, last.toHz) : [], atHz).map((hz) => {
        const { totalDb, shares } = pathCorrectionAt(terms, hz);
        return {
          frequencyHz: hz,
          totalDb,
          shares: shares.map(({ shareDb, inPath, factor }) => ({ shareDb, inPath, rows: rowsOf(factor) })),
        };
      }),
    };
  });
}

function withAsked(frequenciesHz: number[], atHz: number | undefined): number[] {
  return atHz === undefined ? frequenciesHz : [...new Set([...frequenciesHz, atHz])].sort((a, b) => a - b);
}

function rowsOf(factor: FactorAt | null): CorrectionAt['shares'][number]['rows'] {
  if (!factor) return null;
  const { lowerHz, lowerDb, upperHz, upperDb } = factor;
  return { lowerHz, lowerDb, upperHz, upperDb };
}

/** Stretches that every correction knows and no step of uncertainty covers. */
function withoutUncertainty(corrections: CorrectionView[], { uncertainty }: SignalPathRevision) {
  const known = corrections.flatMap(({ stretches }) => stretches.filter(({ missing }) => missing.length === 0));
  if (known.length === 0) return [];
  const fromHz = Math.min(...known.map((one) => one.fromHz));
  const toHz = Math.max(...known.map((one) => one.toHz));
  return PURPOSES_WITH_U.flatMap((purpose) => {
    const bare: PathRecord['withoutUncertainty'] = [];
    let reached = fromHz;
    for (const step of [...uncertainty[purpose]].sort((a, b) => a.startHz - b.startHz)) {
      if (step.startHz > reached && reached < toHz) {
        bare.push({ purpose, fromHz: reached, toHz: Math.min(step.startHz, toHz) });
      }
      reached = Math.max(reached, step.stopHz);
    }
    if (reached < toHz) bare.push({ purpose, fromHz: reached, toHz });
    return bare;
  });
}
