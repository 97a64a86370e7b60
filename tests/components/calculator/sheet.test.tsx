import { renderToStaticMarkup } from 'react-dom/server';
import { CalculatorSheet } from '@/components/calculator/CalculatorSheet';
import { PANES } from '@/components/calculator/panes';

const html = (query: string) => renderToStaticMarkup(<CalculatorSheet query={query} />);
const words = (markup: string) =>
  markup
    .replace(/<[^>]+>/g, ' ')
    .replace(/\s+/g, ' ')
    .replace(/ ([.,:;])/g, '$1');

describe.each(PANES)('$title', ({ id, title }) => {
  const markup = html(`pane=${id}`);
  test('opens empty: one heading, its name marked, nothing chosen, no style in the markup', () => {
    expect(markup.match(/<h1/g)).toHaveLength(1);
    expect(markup.match(/aria-current="page"/g)).toHaveLength(1);
    expect(words(markup)).toContain(title);
    expect(markup).not.toMatch(/\sstyle="/);
    expect(markup).not.toContain('aria-invalid');
    // the one choice that stands at the start says itself that nothing is converted
    const checked = [...markup.matchAll(/<option value="([^"]+)"[^>]*selected|value="([^"]+)"[^>]*checked/g)].map(
      ([, a, b]) => a ?? b,
    );
    expect(checked.filter((value) => value !== id)).toEqual(id === 'field' ? ['none'] : []);
  });
  test('says neither pass nor fail, and every field has a label', () => {
    expect(words(markup)).not.toMatch(/\b(pass|fail)(ed|es|s)?\b/i);
    for (const [, name] of markup.matchAll(/<(?:input|select)[^>]* id="([^"]+)"/g))
      expect(markup).toContain(`for="${name}"`);
  });
});

test('an address opens as it was left: the figure, its sentence and its working with every term and source', () => {
  const markup = html('pane=field&unit=dBuV&reading=52%2C1&af=14.3&loss=2.1&gain=31.1');
  const text = words(markup);
  expect(text).toContain('The field is 37.40 dBµV/m');
  const sum = words(/<dl class="sum[\s\S]*?<\/dl>/.exec(markup)![0]);
  for (const term of [
    '52.10 dBµV reading',
    '+ 14.30 dB/m antenna factor',
    '+ 2.10 dB cable loss',
    '− 31.10 dB preamplifier gain',
  ]) {
    expect(sum).toContain(term);
  }
  expect(sum).toContain('– distance correction not chosen, nothing added');
  expect(sum.match(/as typed here/g)).toHaveLength(4);
});

test('an impossible input says where and why beside its field', () => {
  const markup = html('pane=mismatch&as=vswr&vs=0.5&vl=2');
  expect(words(markup)).toContain('0.5 is no VSWR. It is at least 1.');
  expect(markup.match(/aria-invalid="true"/g)).toHaveLength(1);
  expect(words(markup)).toContain('waits for source port');
});

test('the figure that the address asks for is the one explained', () => {
  const query = 'pane=levels&unit=dBm&level=-30&ohm=50';
  expect(html(query)).toMatch(/aria-label="Voltage level 76\.99 dBµV, show working" aria-expanded="true"/);
  expect(html(`${query}&show=volts`)).toMatch(/aria-label="Voltage 7\.071 mV, show working" aria-expanded="true"/);
  expect(html(`${query}&show=gone`).match(/aria-expanded="true" data-tie/g)).toHaveLength(1);
});
