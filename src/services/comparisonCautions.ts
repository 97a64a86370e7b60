import type { TracePair } from '@/emc/difference';
import type { Caution } from '@/schemas/comparison';
import { coarserStepHz, overlapOf, unitsOf, type Side } from './comparedRuns';

/** Why a difference of two runs holds more than the modification between them, the weightiest first. */
export function cautionsOf(a: Side, b: Side, pairs: readonly TracePair[]): Caution[] {
  return [...unlikeFigures(a, b), ...unlikeTraces(a, b, pairs), ...unlikeSetups(a, b)];
}

type What = Caution['what'];
type Value = Caution['a'];

const unlike = (what: What, a: Value, b: Value): Caution[] => (a === b ? [] : [{ what, a, b }]);

function unlikeFigures(a: Side, b: Side): Caution[] {
  const units = unlike('unit', unitsOf(a).join(', '), unitsOf(b).join(', '));
  const overlap = overlapOf(a.run, b.run);
  if (!overlap) return [...units, { what: 'no-overlap', a: null, b: null }];
  const whole = [a.run, b.run].every(({ firstHz, lastHz }) => firstHz === overlap.fromHz && lastHz === overlap.toHz);
  const part: Caution[] = whole ? [] : [{ what: 'overlap', a: overlap.fromHz, b: overlap.toHz }];
  return [...units, ...part];
}

function unlikeTraces(a: Side, b: Side, pairs: readonly TracePair[]): Caution[] {
  const cautions: Caution[] = [];
  for (const pair of pairs) {
    const one = a.context.heads.find(({ index }) => index === pair.a)!;
    const other = b.context.heads.find(({ index }) => index === pair.b)!;
    if (!pair.sameDetector) cautions.push({ what: 'detector', a: one.detector, b: other.detector });
    cautions.push(...unlike('rbw', one.rbwHz, other.rbwHz));
  }
  const alone = (side: Side, paired: number[]) => side.context.heads.filter(({ index }) => !paired.includes(index));
  if (pairs.length > 0) {
    for (const { name } of alone(
      a,
      pairs.map((pair) => pair.a),
    ))
      cautions.push({ what: 'no-counterpart', a: name, b: null });
    for (const { name } of alone(
      b,
      pairs.map((pair) => pair.b),
    ))
      cautions.push({ what: 'no-counterpart', a: null, b: name });
    const stepHz = coarserStepHz(a.run, b.run);
    if (stepHz > 0) cautions.push({ what: 'step', a: a.run.stepHz, b: b.run.stepHz });
  }
  return cautions.filter(
    (one, at) => cautions.findIndex(({ what, a, b }) => what === one.what && a === one.a && b === one.b) === at,
  );
}

function unlikeSetups(a: Side, b: Side): Caution[] {
  const position = ({ run }: Side) => run.polarisation ?? run.line;
  const height = ({ run }: Side) => (run.heightSwept ? 'swept' : run.heightM);
  const path = ({ context: { path } }: Side) => path && `${path.path.code} revision ${path.revision.revision}`;
  const limits = ({ run }: Side) => `${run.limitSet.name}, revision ${run.limitSet.revision}`;
  return [
    ...unlike('position', position(a), position(b)),
    ...unlike('height', height(a), height(b)),
    ...unlike('distance', a.run.distanceM, b.run.distanceM),
    ...unlike('path', path(a), path(b)),
    ...unlike('limits', limits(a), limits(b)),
    ...unlike('mode', a.run.operatingMode, b.run.operatingMode),
    ...unlike('partial', a.run.partial && a.run.number, b.run.partial && b.run.number),
    ...unlike('voided', a.run.voidedAt && a.run.number, b.run.voidedAt && b.run.number),
  ];
}
