import { proposeFromName } from '@/ingest/proposals';

test.each([
  ['ld40_m2_h_100.csv', { state: 'M2', polarisation: 'horizontal', heightM: 1 }],
  ['ld40_m2_v_200.csv', { state: 'M2', polarisation: 'vertical', heightM: 2 }],
  ['TP9 M0 vert 1.5m amb.txt', { state: 'M0', polarisation: 'vertical', heightM: 1.5, purpose: 'ambient' }],
  ['MA2-M1-Hor-h250-Final.CSV', { state: 'M1', polarisation: 'horizontal', heightM: 2.5, purpose: 'final' }],
  ['ld40_m2_dim_l.csv', { state: 'M2', line: 'L' }],
  ['mains_M0_N.tsv', { state: 'M0', line: 'N' }],
  ['motor L1 prescan.csv', { line: 'L1', purpose: 'prescan' }],
  ['C:\\scans\\v\\pump_m10_hor.csv', { state: 'M10', polarisation: 'horizontal' }],
  ['trace001.csv', {}],
  ['h_v_both.csv', {}],
  ['l_and_n.csv', {}],
  ['m1_to_m2.csv', {}],
  ['volume_100.csv', {}],
  ['', {}],
])('%s suggests %j', (name, proposals) => {
  expect(proposeFromName(name)).toEqual(proposals);
});
