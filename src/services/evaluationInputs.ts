import { RULE_NAMES, type DecisionRule } from '@/emc/kinds';
import { FactorTableRevision } from '@/models/factorTableRevision';
import { LimitLineRevision } from '@/models/limitLineRevision';
import { LimitSet } from '@/models/limitSet';
import type { SignalPath } from '@/models/signalPath';
import { SignalPathRevision } from '@/models/signalPathRevision';
import type { StoredInputs } from '@/models/stored';
import type { LimitLineView } from '@/schemas/sweep';
import type { LoadedPath, LoadedTerm } from './signalPaths';

/** The revisions a judgement uses, as an evaluation names them. */
export function inputsOf(used: {
  path: LoadedPath | null;
  terms: LoadedTerm[];
  limitSet: LimitSet;
  lines: LimitLineView[];
}): StoredInputs {
  const { path, terms, limitSet, lines } = used;
  return {
    pathRevision: path?.revision.publicId ?? null,
    factorTables: terms.map(({ term, table }) => ({ term: term.id, table: table.publicId, applied: term.applied })),
    limitSet: limitSet.publicId,
    limitLines: lines.map((line) => line.id),
    uncertaintyOf: path?.revision.publicId ?? null,
  };
}

/** Engine and revisions of one evaluation. */
export interface Used {
  engine: string;
  decisionRule: DecisionRule;
  inputs: StoredInputs;
}

/** One thing that an evaluation used otherwise than another: `table ANT-02 vertical`, `revision 2`, `revision 1`. */
export interface InputChange {
  what: string;
  now: string;
  before: string;
}

interface Named {
  /** What stays the same over its revisions. */
  key: string;
  what: string;
  revision: string;
}

/** Names every revision that some evaluations used; five queries for any number of them. */
export async function nameInputs(all: readonly StoredInputs[]) {
  const publicId = (ids: (string | null | undefined)[]) => ({
    publicId: [...new Set(ids.filter(Boolean))] as string[],
  });
  const revisions = await SignalPathRevision.findAll({
    where: publicId(all.map((inputs) => inputs.pathRevision)),
    include: ['path'],
  });
  const tables = await FactorTableRevision.findAll({
    where: publicId(all.flatMap((inputs) => inputs.factorTables.map(({ table }) => table))),
    attributes: ['publicId', 'equipmentId', 'name', 'revision'],
  });
  const sets = await LimitSet.findAll({ where: publicId(all.map((inputs) => inputs.limitSet)) });
  const lines = await LimitLineRevision.findAll({
    where: publicId(all.flatMap((inputs) => inputs.limitLines)),
    attributes: ['publicId', 'lineKey', 'name', 'revision'],
  });
  const revision = (number: number) => `revision ${number}`;
  return new Map<string, Named>([
    ...revisions.map((row): [string, Named] => {
      const { path } = row as SignalPathRevision & { path: SignalPath };
      return [row.publicId, { key: path.code, what: `path ${path.code}`, revision: revision(row.revision) }];
    }),
    ...tables.map((row): [string, Named] => {
      const key = `${row.equipmentId} ${row.name}`;
      return [row.publicId, { key, what: `table ${row.name}`, revision: revision(row.revision) }];
    }),
    ...sets.map((row): [string, Named] => [
      row.publicId,
      { key: row.name, what: `limit set ${row.name}`, revision: revision(row.revision) },
    ]),
    ...lines.map((row): [string, Named] => [
      row.publicId,
      { key: row.lineKey, what: `limit line ${row.name}`, revision: revision(row.revision) },
    ]),
  ]);
}

/**
 * What `now` uses otherwise than `before`: tables first, since they move the figures, then lines, path, set and engine.
 * A table or line that only one of them used is said so.
 */
export function changesBetween(before: Used, now: Used, names: ReadonlyMap<string, Named>): InputChange[] {
  const tablesOf = ({ inputs }: Used) => inputs.factorTables.map(({ table }) => table);
  const changes = [
    ...pairedChanges(tablesOf(before), tablesOf(now), names),
    ...pairedChanges(before.inputs.limitLines, now.inputs.limitLines, names),
    ...pairedChanges(listed(before.inputs.pathRevision), listed(now.inputs.pathRevision), names),
    // What was written before sets were named says nothing of its set.
    ...(before.inputs.limitSet ? pairedChanges([before.inputs.limitSet], listed(now.inputs.limitSet), names) : []),
  ];
  if (before.decisionRule !== now.decisionRule) {
    changes.push({ what: 'decision rule', now: RULE_NAMES[now.decisionRule], before: RULE_NAMES[before.decisionRule] });
  }
  if (before.engine !== now.engine) changes.push({ what: 'engine', now: now.engine, before: before.engine });
  return changes;
}

const listed = (id: string | null | undefined): string[] => (id ? [id] : []);

function pairedChanges(before: string[], now: string[], names: ReadonlyMap<string, Named>): InputChange[] {
  const named = (ids: string[]) => ids.flatMap((id) => names.get(id) ?? []);
  const [were, are] = [named(before), named(now)];
  const gone = were.filter(({ key }) => !are.some((one) => one.key === key));
  const changed = are.flatMap((one): InputChange[] => {
    const was = were.find(({ key }) => key === one.key);
    if (was?.revision === one.revision) return [];
    return [{ what: one.what, now: one.revision, before: was?.revision ?? 'not used' }];
  });
  return [...changed, ...gone.map(({ what, revision }) => ({ what, now: 'no longer used', before: revision }))];
}
