import { factorShapes } from '@fixtures/shapes/factorShapes';
import { oddShapes } from '@fixtures/shapes/oddShapes';
import { sweepShapes } from '@fixtures/shapes/sweepShapes';
import { runThrough } from '@/ingest/bytes';
import { readSweep, readSweepSteps } from '@/ingest/read';
import { recognise, recogniseSteps } from '@/ingest/recognise';
import { ScannedFile } from '@/ingest/scannedFile';
import type { Answers, Recognition } from '@/ingest/types';
import { TO_HZ, type FrequencyUnit } from '@/ingest/units';

/* A server recognises a file, previews it and keeps it; all three may share one scan, and must not show that they did. */

const answers = (recognition: Recognition, frequencyUnit: FrequencyUnit): Answers => ({
  frequencyUnit,
  sweepIndex: 0,
  centreHz: 0,
  partial: recognition.partial !== null,
  traces: recognition.traces.map(({ index, unit }) => ({ index, use: true, unit: unit ?? 'dBuV' })),
});

const outcome = (work: () => unknown) => {
  try {
    return work();
  } catch (error) {
    return (error as Error).message;
  }
};

test.each([...sweepShapes, ...oddShapes, ...factorShapes].map((shape) => [shape.name, shape] as const))(
  '%s is recognised and read alike from its bytes and from one scan, in every unit',
  (name, { bytes }) => {
    const scanned = new ScannedFile(bytes);
    const recognition = recognise(bytes, name);
    expect(runThrough(recogniseSteps(scanned, name))).toEqual(recognition);
    for (const unit of Object.keys(TO_HZ) as FrequencyUnit[]) {
      const answered = answers(recognition, unit);
      const apart = outcome(() => readSweep(bytes, recognition, answered));
      expect(outcome(() => runThrough(readSweepSteps(scanned, recognition, answered)))).toEqual(apart);
    }
    expect(runThrough(recogniseSteps(scanned, name))).toEqual(recognition);
  },
);
