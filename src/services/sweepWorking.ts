import type { z } from 'zod';
import { authorise, type Actor } from '@/auth/actor';
import type { WorkingTerm } from '@/emc/types';
import { workingAt } from '@/emc/working';
import { Invalid } from '@/errors';
import { readPieces, type StoredPiece } from '@/models/traceStore';
import { unitOfWork } from '@/models/unitOfWork';
import type { workingQuery, WorkingView } from '@/schemas/sweep';
import { daysBetween, dueOnDay } from './calibrationState';
import { contextOf, findRun, type Run, type RunContext } from './runs';
import type { LoadedTerm } from './signalPaths';

/** The points of a few neighbouring segments as one array per trace. */
export function joined(pieces: StoredPiece[], index: number): { frequencyHz: Float64Array; reading: Float32Array } {
  const total = pieces.reduce((sum, piece) => sum + piece.frequencyHz.length, 0);
  const frequencyHz = new Float64Array(total);
  const reading = new Float32Array(total);
  let at = 0;
  for (const piece of pieces) {
    frequencyHz.set(piece.frequencyHz, at);
    reading.set(piece.levels.get(index)!, at);
    at += piece.frequencyHz.length;
  }
  return { frequencyHz, reading };
}

/** Segments around a frequency; the whole run when it falls between segments or outside them. */
async function piecesNear(run: Run, frequencyHz: number): Promise<StoredPiece[]> {
  // an axis may fall
  const slack = Math.abs(run.stepHz ?? 0);
  const near = await readPieces(run.id, { fromHz: frequencyHz - slack, toHz: frequencyHz + slack });
  return near.length ? near : readPieces(run.id);
}

/** How level and margin came about at the measured point nearest to a frequency, with the source of every figure. */
export async function readWorking(
  actor: Actor | null,
  publicId: string,
  { frequencyHz, trace, line }: z.infer<typeof workingQuery>,
): Promise<WorkingView> {
  authorise(actor, 'sweep.read');
  return unitOfWork(async () => {
    const run = await findRun(actor, publicId);
    const context = await contextOf(run);
    const head = context.heads.find(({ index }) => index === trace);
    if (!head) throw new Invalid([{ pointer: '/query/trace', message: 'is not a trace of this run' }]);
    if (line && !context.lines.some(({ id }) => id === line)) {
      throw new Invalid([{ pointer: '/query/line', message: 'is not a line of this run’s limit set' }]);
    }
    const points = joined(await piecesNear(run, frequencyHz), trace);
    const input = { ...context.judged, traces: [{ ...head, ...points }] };
    const working = workingAt(input, trace, frequencyHz, line);
    const judgedBy = context.lines.find(({ id }) => id === working.lineId);
    return {
      ...working,
      terms: working.terms.map((term) => sourced(term, run, context)),
      decisionRule: context.judged.rule,
      limitSource: judgedBy ? `${judgedBy.document}, ${judgedBy.source}, revision ${judgedBy.revision}` : null,
    };
  });
}

function sourced(term: WorkingTerm, run: Run, context: RunContext): WorkingView['terms'][number] {
  const { termId, rows, ...figure } = term;
  const loaded = context.terms.find(({ term: { id } }) => id === termId);
  return {
    ...figure,
    source: loaded ? sourceOf(loaded) : readingSource(term, run, context),
    calibration: loaded ? calibrationOf(loaded) : null,
    warning: loaded ? warningOf(loaded, context.day) : null,
    table: rows && loaded ? { name: loaded.table.name, ...rows } : null,
  };
}

/** The table by its name, which begins with its equipment's identifier by custom. */
function sourceOf({ item, table }: LoadedTerm): string {
  const { identifier } = item.equipment;
  const name = table.name.startsWith(identifier) ? table.name : `${identifier}, ${table.name}`;
  return table.revision === 1 ? name : `${name}, revision ${table.revision}`;
}

function calibrationOf({ table }: LoadedTerm): WorkingView['terms'][number]['calibration'] {
  const { calibration } = table as typeof table & { calibration: { calibratedOn: string; certificate: string } | null };
  return calibration && { on: calibration.calibratedOn, certificate: calibration.certificate };
}

function warningOf({ item }: LoadedTerm, day: string): string | null {
  const due = item.calibration?.dueOn;
  switch (dueOnDay(item.calibration, day)) {
    case 'due-soon':
      return `due in ${daysBetween(day, due!)} days`;
    case 'lapsed':
      return `calibration lapsed on ${due!}`;
    case 'not-calibrated':
      return 'no calibration on record';
    case 'in-date':
      return null;
  }
}

function readingSource(term: WorkingTerm, run: Run, context: RunContext): string {
  if (term.sign !== '') return 'dBm into 50 ohm, 10 log10(50) + 90';
  const receiver = context.path?.items.findLast((item) => item.stored.term === null)?.equipment.identifier;
  const parts = [receiver, run.file.name];
  return parts.filter(Boolean).join(', ');
}
