import type { Actor } from '@/auth/actor';
import { found } from '@/app/found';
import { formatDb } from '@/format/quantities';
import type { SampleView } from '@/schemas/job';
import { windowQuery, type WindowView } from '@/schemas/sweep';
import { listCandidates } from '@/services/sweeps';
import { readWindow } from '@/services/sweepWindow';
import type { Standing, StandingReader } from './standing';
import { counted, portsOf, type Port, type Run } from './worstRun';

export type State = SampleView['states'][number];

export interface GridCell {
  state: State;
  /** null where this port was not measured in this state. */
  standing: Standing | null;
  window: WindowView | null;
  /** Of a planned state: what it has to bring. */
  needs?: string;
}
export interface GridRow {
  port: Port;
  cells: GridCell[];
  /** The newest measured one: it names the method of the row. */
  latest: Standing;
}
export interface Grid {
  states: State[];
  rows: GridRow[];
  /** Older states that found no place. */
  left: number;
}

/** Four columns fit the sheet; small multiples are at most 12, each the kept layer of its run. */
const MAX_STATES = 4;
const MAX_CHARTS = 12;

/** Worst run of each port in each state, with its extremes per column; ports are rows, states are columns. */
export async function stateGrid(
  actor: Actor,
  sample: SampleView,
  runs: readonly Run[],
  read: StandingReader,
): Promise<Grid> {
  const ports = portsOf(runs);
  const columns = Math.min(MAX_STATES, Math.floor(MAX_CHARTS / Math.max(1, ports.length)));
  const states = sample.states.slice(-columns);
  const rows: GridRow[] = [];
  for (const port of ports) {
    const own = counted(runs).filter((run) => run.port === port);
    const cells: GridCell[] = [];
    let latest: Standing | null = null;
    for (const state of states) {
      const standing = await read(own.filter((run) => run.state === state.label));
      const needs = state.planned && !standing ? await needed(actor, latest) : undefined;
      cells.push({ state, standing, window: standing && (await wholeWindow(actor, standing)), needs });
      latest = standing ?? latest;
    }
    latest ??= await read(own);
    if (latest) rows.push({ port, latest, cells: onOneAxis(cells) });
  }
  return { states, rows, left: sample.states.length - states.length };
}

/** The layer kept with the evaluation: nothing is computed from points for a small multiple. */
function wholeWindow(actor: Actor, { sweep }: Standing): Promise<WindowView> {
  return found(readWindow(actor, sweep.id, windowQuery.parse({ fromHz: sweep.firstHz, toHz: sweep.lastHz })));
}

/** A row shares its frequency axis, so that one place means one frequency in all its charts. */
function onOneAxis(cells: GridCell[]): GridCell[] {
  const windows = cells.flatMap(({ window }) => window ?? []);
  const fromHz = Math.min(...windows.map((window) => window.fromHz));
  const toHz = Math.max(...windows.map((window) => window.toHz));
  return cells.map((cell) => (cell.window ? { ...cell, window: { ...cell.window, fromHz, toHz } } : cell));
}

/** What the planned state has to bring so that every emission of the governing run is under by more than U. */
async function needed(actor: Actor, before: Standing | null): Promise<string> {
  if (!before) return 'not measured yet';
  if (before.verdict === 'needs-final') return 'a final first';
  const { items } = await found(listCandidates(actor, before.sweep.id, { limit: 50 }));
  const lackingDb = Math.max(0, ...items.map(({ uncertaintyDb, marginDb }) => uncertaintyDb - marginDb));
  return lackingDb > 0 ? `needs ${formatDb(lackingDb)} dB` : 'nothing more';
}
