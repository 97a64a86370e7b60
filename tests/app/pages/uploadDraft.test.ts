import { recognise } from '@/ingest/recognise';
import { asBefore } from '@/app/(lab)/sweeps/new/asBefore';
import { choiceOf, draftFrom, keepBody, stillToSay } from '@/app/(lab)/sweeps/new/draft';
import type { Draft } from '@/app/(lab)/sweeps/new/draftTypes';
import { sameAsLast } from '@/app/(lab)/sweeps/new/sameAsLast';
import { spanOf } from '@/app/(lab)/sweeps/new/spanOf';
import type { UploadLists } from '@/app/(lab)/sweeps/new/uploadLists';
import { proposeFromName } from '@/ingest/proposals';
import type { SweepFileView } from '@/schemas/sweepFile';

/* What is proposed for a dropped file, and what "same as last" takes. */

const segment = (startHz: number, stopHz: number) => ({
  startHz,
  stopHz,
  startLimit: 40,
  stopLimit: 40,
  over: 'log-frequency' as const,
});
const path = (id: string, port: 'enclosure' | 'ac-mains', terms: string[]) => ({
  id,
  code: id,
  port,
  lowHz: port === 'enclosure' ? 30e6 : 150e3,
  highHz: port === 'enclosure' ? 1e9 : 30e6,
  distanceM: port === 'enclosure' ? 3 : null,
  items: [],
  terms: terms.map((term) => ({ id: term, identifier: term, name: 'cable loss' })),
});
const limitSet = (id: string, port: 'enclosure' | 'ac-mains', from: number, to: number) => ({
  id,
  name: id,
  port,
  distanceM: port === 'enclosure' ? 3 : null,
  lines: [{ id: `${id}-line`, segments: [segment(from, to)] }],
});
const lists = {
  samples: [
    {
      id: 'ld40',
      code: 'S-047',
      product: { code: 'LD-40', name: 'Lumen strip driver' },
      states: ['M0', 'M1', 'M2'].map((label) => ({ id: `ld40-${label}`, label, planned: false })),
    },
    {
      id: 'tp9',
      code: 'S-048',
      product: { code: 'TP-9', name: 'Tide probe' },
      states: [{ id: 'tp9-M0', label: 'M0', planned: false }],
    },
  ],
  paths: [path('P-3', 'enclosure', ['CBL-1']), path('P-4', 'enclosure', ['CBL-2']), path('P-1', 'ac-mains', [])],
  limitSets: [
    limitSet('radiated', 'enclosure', 30e6, 1e9),
    limitSet('stricter', 'enclosure', 30e6, 1e9),
    limitSet('mains', 'ac-mains', 150e3, 30e6),
  ],
  trials: [],
} as unknown as UploadLists;

/** A file as the lab holds it. */
function fileOf(name: string, lines: string[], before: SweepFileView['asBefore'] = null): SweepFileView {
  const proposed = proposeFromName(name);
  return {
    id: name,
    name,
    bytes: 1,
    sha256: '',
    recognition: recognise(new TextEncoder().encode(`${lines.join('\n')}\n`), name),
    repeats: [],
    proposals: {
      polarisation: proposed.polarisation ?? null,
      line: proposed.line ?? null,
      heightM: proposed.heightM ?? null,
      state: proposed.state ?? null,
      purpose: proposed.purpose ?? null,
    },
    asBefore: before,
  };
}
const rows = (count = 60, from = 30) =>
  Array.from({ length: count }, (_, i) => `${(from + i * 0.1).toFixed(3)};${(30 + ((i * 7) % 5) / 10).toFixed(2)}`);
const bare = (name: string, before: SweepFileView['asBefore'] = null) => fileOf(name, ['X;Y', ...rows()], before);
const stated = (name: string) =>
  fileOf(name, ['Detector;Average', 'RBW;120;kHz', 'Frequency [MHz];Level [dBm]', ...rows()]);

const before: NonNullable<SweepFileView['asBefore']> = {
  run: { id: 'run', number: 'R-26-031' },
  port: 'enclosure',
  pathId: 'P-4',
  limitSetId: 'stricter',
  distanceM: 3,
  heightSwept: true,
  valuesHold: 'receiver-input',
  alreadyCorrected: ['CBL-2'],
  frequencyUnit: 'MHz',
  traces: [{ index: 0, unit: 'dBuV', detector: 'peak', rbwHz: 120e3 }],
};
const said = (draft: Draft): Draft => ({ ...draft, operatingMode: 'full brightness', polarisation: 'horizontal' });

describe('the limit set that is proposed', () => {
  const far = { ...lists.limitSets[0]!, id: 'at 10 m', distanceM: 10 };
  const proposedOf = (limitSets: UploadLists['limitSets']) =>
    draftFrom(stated('ld40_m2_h_100.csv'), { ...lists, limitSets }, null);

  test('is for the distance of the path, whatever the lab entered first', () => {
    // The list is newest first.
    expect(proposedOf([...lists.limitSets, far])).toMatchObject({ limitSetId: 'stricter', distanceM: '3' });
  });

  test('is left to be said where the lab has none for that distance', () => {
    const draft = proposedOf([far]);
    expect(draft.limitSetId).toBe('');
    expect(stillToSay(draft, stated('ld40_m2_h_100.csv'))).toContain('the limit set');
  });
});

describe('the last file of a shape', () => {
  test('fills what the file leaves open, names it, and is not taken as said', () => {
    const file = bare('ld40_m2_h_100.csv', before);
    const draft = said(draftFrom(file, lists, null));
    expect(draft).toMatchObject({
      pathId: 'P-4',
      limitSetId: 'stricter',
      alreadyCorrected: ['CBL-2'],
      frequencyUnit: 'MHz',
      traces: [{ unit: 'dBuV', detector: 'peak', rbwKhz: '120' }],
    });
    const took = ['frequencies in MHz', 'dBµV', 'peak', 'RBW 120 kHz', 'CBL-2 already in the reading'];
    expect(draft.asBefore).toEqual({ number: 'R-26-031', took, holds: false });
    expect(stillToSay(draft, file)).toEqual(['whether it is as in R-26-031']);
    expect(keepBody(draft, file)).toBeNull();
    // It may be looked at before it is confirmed.
    expect(choiceOf(draft, file)).not.toBeNull();
    const confirmed = { ...draft, asBefore: { ...draft.asBefore!, holds: true } };
    expect(keepBody(confirmed, file)).toMatchObject({ alreadyCorrected: ['CBL-2'], polarisation: 'horizontal' });
  });

  test('overrides nothing that the file states, and then there is nothing to confirm', () => {
    const file = { ...stated('ld40_m2_h_100.csv'), asBefore: { ...before, alreadyCorrected: [] } };
    const draft = draftFrom(file, lists, null);
    expect(draft.traces).toMatchObject([{ unit: 'dBm', detector: 'average', rbwKhz: '120' }]);
    expect(draft.asBefore).toBeNull();
  });

  test('what the file says its values hold wins over what was said of the last', () => {
    const lines = ['Corrected for;cable loss', 'Frequency [MHz];Level [dBm]', ...rows()];
    const file = { ...fileOf('ld40_m2_h.csv', lines), asBefore: { ...before, alreadyCorrected: [] } };
    expect(draftFrom(file, lists, null).alreadyCorrected).toEqual(['CBL-2']);
  });

  test('of another port, path and limits are not taken', () => {
    const file = {
      ...bare('x.csv'),
      asBefore: { ...before, port: 'ac-mains' as const, pathId: 'P-1', limitSetId: 'mains' },
    };
    const draft = draftFrom(file, lists, null);
    expect(draft).toMatchObject({ port: 'enclosure', pathId: 'P-3' });
    expect(draft.limitSetId).not.toBe('mains');
  });

  test('a path that is gone is not taken, nor what was in its reading', () => {
    const file = bare('x.csv', { ...before, pathId: 'P-9', alreadyCorrected: ['CBL-9'] });
    expect(draftFrom(file, lists, null)).toMatchObject({ pathId: 'P-3', alreadyCorrected: [] });
  });

  test('field strength is proposed with its unit, and takes no factor off', () => {
    const traces = [{ index: 0, unit: 'dBuV/m' as const, detector: 'peak' as const, rbwHz: 120e3 }];
    const file = bare('x.csv', { ...before, valuesHold: 'field', alreadyCorrected: [], traces });
    const draft = draftFrom(file, lists, null);
    expect(draft).toMatchObject({ valuesHold: 'field', alreadyCorrected: [], traces: [{ unit: 'dBuV/m' }] });
    expect(draft.asBefore!.took).toContain('values are field strength');
  });

  test('without one nothing changes', () => {
    const file = bare('x.csv');
    const draft = draftFrom(file, lists, null);
    expect(asBefore(draft, file, lists)).toBe(draft);
    expect(stillToSay(draft, file)).toContain('the unit of the frequencies');
  });
});

describe('same as last', () => {
  const last = bare('ld40_m2_h_100.csv');
  const lastDraft: Draft = {
    ...draftFrom(last, lists, null),
    operatingMode: 'full brightness',
    trial: 'foil on lid',
    pathId: 'P-4',
    limitSetId: 'stricter',
    alreadyCorrected: ['CBL-2'],
    frequencyUnit: 'MHz',
    heightSwept: true,
    purpose: 'final',
    traces: [{ index: 0, use: true, name: 'Y', unit: 'dBuV', detector: 'quasi-peak', rbwKhz: '120' }],
  };
  const take = (file: SweepFileView) =>
    sameAsLast({ draft: draftFrom(file, lists, null), file }, { draft: lastDraft, file: last }, lists.samples);

  test('takes path, limits, mode, trial and what the file does not state; the name keeps its own', () => {
    expect(take(bare('ld40_m2_v_200.csv'))).toMatchObject({
      stateId: 'ld40-M2',
      polarisation: 'vertical',
      heightM: '2',
      operatingMode: 'full brightness',
      trial: 'foil on lid',
      pathId: 'P-4',
      limitSetId: 'stricter',
      alreadyCorrected: ['CBL-2'],
      heightSwept: true,
      purpose: 'final',
      frequencyUnit: 'MHz',
      traces: [{ unit: 'dBuV', detector: 'quasi-peak', rbwKhz: '120' }],
    });
  });

  test('a state, a purpose and another sample in the name stay', () => {
    expect(take(bare('ld40_m1_v_amb.csv'))).toMatchObject({ stateId: 'ld40-M1', purpose: 'ambient' });
    expect(take(bare('tp9_v.csv'))).toMatchObject({ stateId: 'tp9-M0' });
    expect(take(bare('no_name_v.csv'))).toMatchObject({ stateId: 'ld40-M2' });
  });

  test('what the file states of itself stays', () => {
    const { traces, frequencyUnit } = take(stated('ld40_m2_v_200.csv'));
    expect([frequencyUnit, traces]).toEqual(['MHz', [expect.objectContaining({ unit: 'dBm', detector: 'average' })]]);
  });

  test('filler of this file is not used because the last one used that column', () => {
    const filled = rows().map((row) => `${row};-200.00`);
    const file = fileOf('ld40_m2_v.csv', ['Frequency [MHz];A [dBuV];B [dBuV]', ...filled]);
    const from = { ...lastDraft, traces: [0, 1].map((index) => ({ ...lastDraft.traces[0]!, index })) };
    const draft = draftFrom(file, lists, null);
    const taken = sameAsLast({ draft, file }, { draft: from, file: last }, lists.samples);
    expect(taken.traces.map(({ use }) => use)).toEqual([true, false]);
  });

  test('a sweep of another port keeps its own path and limits', () => {
    const mains = fileOf('ld40_m2_n.csv', ['Frequency [MHz];A [dBuV]', ...rows(60, 1)]);
    const draft = take(mains);
    expect(draft).toMatchObject({ port: 'ac-mains', pathId: 'P-1', limitSetId: 'mains', line: 'N' });
    expect(draft.operatingMode).toBe('full brightness');
  });

  test('what this file says it holds is not that of the last one', () => {
    const corrected = fileOf('ld40_m2_v.csv', ['Corrected for;antenna factor', 'Frequency [MHz];A [dBuV]', ...rows()]);
    expect(take(corrected).alreadyCorrected).toEqual(draftFrom(corrected, lists, null).alreadyCorrected);
  });
});

describe('the range of a broken file', () => {
  const limits = lists.limitSets[0];
  const broken = (lines: string[]) => {
    const file = fileOf('x.csv', lines);
    expect(file.recognition.partial).not.toBeNull();
    return spanOf(file, draftFrom(file, lists, null), limits);
  };
  const head = 'Frequency [MHz];Peak [dBuV]';

  test('reaches to the declared stop, else to the end of the limit line', () => {
    const stop = broken(['Start;30;MHz', 'Stop;50;MHz', head, ...rows(), '36;']);
    expect(stop).toEqual({ firstHz: 30e6, lastHz: 50e6, notRead: { fromHz: 35.9e6, toHz: 50e6 } });
    expect(broken([head, ...rows(), '36;']).notRead).toEqual({ fromHz: 35.9e6, toHz: 1e9 });
  });

  test('a falling sweep is missing below', () => {
    const falling = rows(60, 100).reverse();
    expect(broken([head, ...falling, '99.9;'])).toEqual({
      firstHz: 30e6,
      lastHz: 105.9e6,
      notRead: { fromHz: 30e6, toHz: 100e6 },
    });
  });

  test('of a whole file nothing is missing', () => {
    const file = stated('x.csv');
    expect(spanOf(file, draftFrom(file, lists, null), limits).notRead).toBeNull();
  });
});
