import { finding, resultMail } from '@/mail/resultMail';
import type { PortResult, StateResult } from '@/schemas/resultMail';

const worst: NonNullable<PortResult['worst']> = {
  kind: 'peak',
  frequencyHz: 144.018e6,
  fromHz: 144e6,
  toHz: 144.1e6,
  marginDb: -6.23,
  uncertaintyDb: 4.94,
  lineName: 'CISPR 32 class B, quasi-peak',
  run: 'R-26-031',
};
const enclosure: PortResult = {
  port: 'enclosure',
  verdict: 'over',
  missing: [],
  worst,
  limitSets: [
    { name: 'CISPR 32 class B, 3 m', revision: 2, lines: [{ name: 'CISPR 32 class B, quasi-peak', revision: 3 }] },
  ],
  runs: ['R-26-030', 'R-26-031'],
};
const mains: PortResult = { ...enclosure, port: 'ac-mains', verdict: 'under', worst: { ...worst, marginDb: 7.1 } };
const port = (
  verdict: PortResult['verdict'],
  change: Partial<NonNullable<PortResult['worst']>> | null,
): PortResult => ({
  ...enclosure,
  verdict,
  worst: change && { ...worst, ...change },
});

test.each<[string, PortResult[], string]>([
  ['over', [enclosure, mains], 'Over by 6.2 dB at 144.018 MHz, enclosure. AC mains is under.'],
  ['under', [port('under', { marginDb: 5.55 })], 'Under by 5.5 dB at 144.018 MHz, enclosure.'],
  ['on the limit', [port('over', { marginDb: -0.04 })], 'Over, on the limit at 144.018 MHz, enclosure.'],
  [
    'inconclusive',
    [port('inconclusive', { marginDb: 2.6 })],
    '2.6 dB under at 144.018 MHz, enclosure, within ±4.9 dB: inconclusive.',
  ],
  [
    'needs a final',
    [port('needs-final', { marginDb: -1 }), { ...mains, verdict: 'needs-final' }],
    '1.0 dB over at 144.018 MHz, enclosure: this needs a final. AC mains needs a final.',
  ],
  [
    'not covered',
    [port('not-covered', { kind: 'floor', fromHz: 30e6, toHz: 60e6, marginDb: 3 })],
    'Enclosure is not covered. What was measured is closest in the noise floor from 30.000 MHz to 60.000 MHz, 3.0 dB under.',
  ],
  ['nothing stood out', [port('under', null)], 'Enclosure is under.'],
])('the finding says %s', (_what, ports, said) => expect(finding(ports)).toBe(said));

const result: StateResult = {
  lab: 'Harrow Lane EMC Bench',
  sender: 'Anselm Rook',
  product: { code: 'LD-40', name: 'Lumen strip driver' },
  sample: { code: 'S-047', serial: 'P2-0193' },
  state: { label: 'M2', description: 'gate resistors' },
  job: { number: 'HL-2611', title: 'LD-40' },
  ports: [enclosure],
  leftOut: { trials: 0, voided: 0 },
  partial: [],
  note: '',
  link: 'https://lab.example/samples/0123456789abcdef#M2',
};

test('every port carries its verdict word, worst margin, U, limits with revisions and runs; no bare sign stands anywhere', () => {
  const { subject, text } = resultMail({ ...result, ports: [enclosure, mains] });
  expect(subject).toBe('Result of LD-40 M2, job HL-2611');
  expect(text).toContain(
    [
      'Enclosure, radiated: over',
      'Worst margin: 6.2 dB over at 144.018 MHz, against CISPR 32 class B, quasi-peak, run R-26-031, U ±4.9 dB',
      'Limits: CISPR 32 class B, 3 m, revision 2 (CISPR 32 class B, quasi-peak, revision 3)',
      'Rests on runs R-26-030, R-26-031',
    ].join('\n'),
  );
  expect(text).toContain('AC mains, conducted: under\nWorst margin: 7.1 dB under at 144.018 MHz');
  expect(text).not.toMatch(/[-−+]\d+\.\d dB|\bpass(es|ed)?\b|\bfail|certified/i);
  expect(text.match(/not a certificate/g)).toHaveLength(1);
});

test('a partial run is said to be partial; trials and voided runs are counted and left out; long lists are cut and say so', () => {
  const missing = Array.from({ length: 9 }, (_, i) => ({
    what: 'range' as const,
    position: 'vertical' as const,
    lineName: 'quasi-peak',
    fromHz: (30 + i) * 1e6,
    toHz: (31 + i) * 1e6,
    because: 'no-trace' as const,
    heightM: null,
  }));
  const { text } = resultMail({
    ...result,
    ports: [{ ...enclosure, missing }],
    leftOut: { trials: 2, voided: 1 },
    partial: [{ run: 'R-26-031', readToHz: 412.5e6 }],
  });
  expect(text).toContain(
    'Left out: two trial runs and one voided run.\nPartial: run R-26-031 was kept up to 412.500 MHz only.',
  );
  expect(text.match(/^Missing: /gm)).toHaveLength(7);
  expect(text).toContain('Missing: 3 more, on the sheet.');
});

test('what people typed can neither break a line of the subject nor bring markup into the html', () => {
  const nasty = {
    ...result,
    product: { code: 'LD\r\nBcc: x@y.example', name: '<img src=x>' },
    note: '<script>1</script>',
  };
  const { subject, html } = resultMail(nasty);
  expect(subject).toBe('Result of LD Bcc: x@y.example M2, job HL-2611');
  expect(html).not.toMatch(/<img|<script/);
});
