import { dropFiles, TRUNCATED_LINE } from '@fixtures/demo/dropFiles';
import { generateFile } from '@fixtures/demo/files';
import { runs } from '@fixtures/demo/runs/all';
import { recognise } from '@/ingest/recognise';

/* The demo lab's files are made by their own script from known sources; recognition has to take them as they are. */

const DAY = '2026-11-17';

test.each(runs.map((run) => [run.fileName, run] as const))(
  '%s is recognised with the traces it was made with',
  (_, run) => {
    const recognition = recognise(generateFile(run, DAY).bytes, run.fileName);
    expect(recognition.refusal).toBeNull();
    expect(recognition.kind).toBe('sweep');
    expect(recognition.traces).toHaveLength(run.traces.length);
    const bare = recognition.headerLine === null;
    for (const [i, trace] of run.traces.entries()) {
      expect(recognition.traces[i]!.detector).toBe(bare ? null : trace.detector);
      if (!bare) expect(recognition.settings.rbwHz).toBe(trace.rbwHz);
    }
  },
);

test('the dropped files: one whole, one cut at its line, one that holds the limiter already', () => {
  const [first, cut, corrected] = dropFiles(DAY).map(({ name, bytes }) => recognise(bytes, name));
  expect(first).toMatchObject({ refusal: null, questions: [], correctedFor: [] });
  expect(cut!.refusal).toMatchObject({ line: TRUNCATED_LINE, found: '2 columns' });
  expect(corrected!.questions.map(({ key }) => key)).toEqual(['alreadyCorrected']);
  expect(corrected!.correctedFor[0]!.what).toMatch(/limiter/);
});
