import { renderToStaticMarkup } from 'react-dom/server';
import { TableFields } from '@/app/(lab)/equipment/[id]/upload/TableFields';
import type { ChosenDraft } from '@/app/(lab)/equipment/[id]/upload/tableDraft';
import type { FactorTablePreview } from '@/schemas/tables';

const inFile = (quantity: FactorTablePreview['tablesInFile'][number]['quantity']) => ({
  index: 0,
  heading: 'Magnetic factor (dB/m)',
  quantity,
  unit: 'dB/m' as const,
  rows: 3,
  firstHz: 9e3,
  lastHz: 30e6,
  lowestDb: -68,
  highestDb: -33,
  proposed: { name: null, polarisation: null, distanceM: null },
});
const draft: ChosenDraft = {
  index: 0,
  use: true,
  revises: '',
  newName: 'LOOP-1',
  quantity: '',
  polarisation: '',
  distanceM: '',
};
const shown = (quantity: Parameters<typeof inFile>[0], asks: string | null) =>
  renderToStaticMarkup(
    <TableFields
      draft={draft}
      inFile={inFile(quantity)}
      several={false}
      named={[]}
      asks={asks}
      errors={{}}
      place={0}
      onChange={() => undefined}
    />,
  );

test('a table that does not say what it is offers every quantity with what it does, and what is asked', () => {
  const html = shown(null, 'Does it give the magnetic field or the equivalent electric field?');
  const options = [...html.matchAll(/<option value="([a-z-]+)"/g)].map(([, value]) => value);
  expect(options).toEqual([
    'antenna-factor',
    'loss',
    'gain',
    'amn-voltage-division',
    'aan-voltage-division',
    'transfer-impedance',
    'magnetic-antenna-factor',
    'clamp-factor',
  ]);
  expect(html).toContain('transfer impedance, subtracted, dBµV to dBµA');
  expect(html).toContain('Does it give the magnetic field or the equivalent electric field?');
});

test('one that says so asks nothing', () => {
  const html = shown('magnetic-antenna-factor', null);
  expect(html).not.toContain('<option value="loss"');
  expect(html).toContain('Read as magnetic antenna factor, by its heading and its signs.');
});
