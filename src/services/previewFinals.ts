import { authorise, type Actor } from '@/auth/actor';
import { limitAt } from '@/emc/limitLine';
import type { EvaluationInput, LimitLine, Trace } from '@/emc/types';
import { workingAt } from '@/emc/working';
import { recognise } from '@/ingest/recognise';
import { unitOfWork } from '@/models/unitOfWork';
import type { FinalsBody, FinalsPreview, JudgedReading } from '@/schemas/finals';
import { composeFinals, type ComposedFinals } from './finals';
import type { FinalsGroup } from './finalsFile';
import { gather } from './judgeFile';
import { judgingOf } from './judging';

/** Typed finals judged as they would be kept now: the same file, path, lines and rule; nothing is stored. */
export async function previewFinals(actor: Actor | null, body: FinalsBody, at = new Date()): Promise<FinalsPreview> {
  authorise(actor, 'sweep.keep');
  return unitOfWork(async () => {
    const { state, files } = await composeFinals(actor, body, at);
    const finals = body.finals.map((): { readings: JudgedReading[] } => ({ readings: [] }));
    for (const composed of files) {
      const { group, file, choice } = composed;
      const { path, terms, lines } = await gather(recognise(file.bytes, file.name), choice, at);
      const { decisionRule: rule } = state.sample.job;
      const judging = judgingOf({
        revision: path?.revision ?? null,
        terms,
        lines,
        purpose: 'final',
        port: body.port,
        rule,
      });
      const input: EvaluationInput = { ...judging, traces: tracesOf(composed) };
      for (const [row, { final, index }] of group.finals.entries()) {
        finals[index]!.readings = final.readings.map(({ detector }) =>
          judged(input, group.detectors.indexOf(detector), row),
        );
      }
    }
    return { finals, runs: files.length };
  });
}

/** The points that reading the file gives, rounded as they are when it is kept. */
function tracesOf({ group, choice }: ComposedFinals): Trace[] {
  const { finals } = group;
  const frequencyHz = Float64Array.from(finals, ({ final }) => final.frequencyHz);
  return choice.traces.map((trace) => ({
    ...trace,
    vbwHz: null,
    rbwShape: null,
    frequencyHz,
    reading: Float32Array.from(levelsOf(group, trace.index)),
  }));
}

function levelsOf({ finals, detectors }: FinalsGroup, trace: number): number[] {
  return finals.map(({ final }) => final.readings.find(({ detector }) => detector === detectors[trace])!.level);
}

/** Against the line its detector is asked for; where there is none, against the first that has a limit there. */
function judged(input: EvaluationInput, traceIndex: number, point: number): JudgedReading {
  const trace = input.traces[traceIndex]!;
  const hz = trace.frequencyHz[point]!;
  const asked = (line: LimitLine) => line.detector === trace.detector && limitAt(line, hz) !== null;
  const line = input.lines.find(asked)?.id;
  const working = workingAt(input, traceIndex, hz, line, point);
  const { level, levelUnit: unit, limit, marginDb, uncertaintyDb, verdict, because } = working;
  const lineName = input.lines.find(({ id }) => id === working.lineId)?.name ?? null;
  const detector = trace.detector as JudgedReading['detector'];
  return { detector, lineName, level, unit, limit, marginDb, uncertaintyDb, verdict, because };
}
