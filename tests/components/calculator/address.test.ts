import { calculatorHref, readAddress } from '@/components/calculator/calculatorAddress';

const opened = (query: string) => readAddress(new URLSearchParams(query));

test('an address is read and written back as it was, commas kept', () => {
  const href = '/calculator?pane=levels&unit=dBm&level=-68%2C5&ohm=50&show=dbua';
  expect(calculatorHref(opened(href.split('?')[1]!))).toBe(href);
  expect(opened('pane=levels&level=-68%2C5').entries.level).toBe('-68,5');
});

test('what is empty or belongs to no field of the pane is left out', () => {
  expect(calculatorHref(opened('pane=eirp&level=&d=3&ohm=50&x=1'))).toBe('/calculator?pane=eirp&d=3');
});

test('fields that a choice brings are kept', () => {
  const href = calculatorHref(opened('pane=field&rule=47cfr&f=13.56&from=3&to=30'));
  for (const part of ['rule=47cfr', 'f=13.56', 'from=3', 'to=30']) expect(href).toContain(part);
});

test('no pane, and one that there is not, is the first; a long value is cut', () => {
  expect(opened('').pane.id).toBe('levels');
  expect(opened('pane=sums').pane.id).toBe('levels');
  expect(opened(`level=${'9'.repeat(500)}`).entries.level).toHaveLength(40);
});
