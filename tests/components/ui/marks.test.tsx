import { renderToStaticMarkup } from 'react-dom/server';
import { VERDICTS } from '@/emc/kinds';
import { KeyHint } from '@/components/ui/KeyHint';
import { StateTag } from '@/components/ui/StateTag';
import { VerdictGlyph } from '@/components/ui/VerdictGlyph';
import { VerdictWord } from '@/components/ui/VerdictWord';

const svg = (verdict: (typeof VERDICTS)[number], props = {}) =>
  renderToStaticMarkup(<VerdictGlyph verdict={verdict} {...props} />);
const square = (markup: string) => {
  const found = /<rect x="([\d.]+)" y="([\d.]+)" width="([\d.]+)" height="([\d.]+)" fill="(\w+)"/.exec(markup);
  return found && { x: +found[1]!, y: +found[2]!, width: +found[3]!, height: +found[4]!, fill: found[5] };
};

describe('design, section 6: the verdict glyph', () => {
  test.each([
    ['under', 'M1 8h14', 9.75, 'currentColor'],
    ['inconclusive', 'M1 8h3.5M11.5 8H15', 5.25, 'none'],
    ['over', 'M1 8h14', 0.75, 'currentColor'],
    ['needs-final', 'M1 8h14', 0.75, 'none'],
  ] as const)('%s: its line, its position, solid or open', (verdict, line, y, fill) => {
    const markup = svg(verdict);
    expect(markup).toContain(`d="${line}"`);
    expect(square(markup)).toEqual({ x: 5.25, y, width: 5.5, height: 5.5, fill });
    expect(markup).toContain('viewBox="0 0 16 16"');
  });
  test('not covered is the dashed line and nothing on it', () => {
    expect(svg('not-covered')).toContain('stroke-dasharray="2 2"');
    expect(square(svg('not-covered'))).toBeNull();
  });
  test('over and under are solid, inconclusive and needs a final are open', () => {
    const open = VERDICTS.filter((verdict) => square(svg(verdict))?.fill === 'none');
    expect(open.sort()).toEqual(['inconclusive', 'needs-final']);
  });
  test('no two verdicts draw the same without their colour', () => {
    const drawn = VERDICTS.map((verdict) => svg(verdict).replace(/glyph-[\w-]+/, ''));
    expect(new Set(drawn).size).toBe(VERDICTS.length);
  });
});

test('a glyph beside its word is silent; alone it says the word', () => {
  expect(svg('needs-final')).toContain('aria-hidden="true"');
  expect(svg('needs-final', { label: true })).toContain('role="img" aria-label="needs a final"');
  expect(svg('over', { label: 'lapsed' })).toContain('aria-label="lapsed"');
});

test.each(VERDICTS)('%s is written in words and never as pass or fail', (verdict) => {
  const text = renderToStaticMarkup(<VerdictWord verdict={verdict} />).replace(/<[^>]+>/g, '');
  expect(text).not.toBe('');
  expect(text).not.toMatch(/pass|fail/i);
});

test('a planned state says so to who cannot see the dashes', () => {
  const text = (planned: boolean) =>
    renderToStaticMarkup(<StateTag label="M3" planned={planned} />).replace(/<[^>]+>/g, '');
  expect(text(false)).toBe('state M3');
  expect(text(true)).toBe('state M3, planned');
});

test('arrows on keys are drawn: neither face of the page has a right arrow', () => {
  for (const key of ['ArrowUp', 'ArrowDown', 'ArrowLeft', 'ArrowRight']) {
    const markup = renderToStaticMarkup(<KeyHint name={key} />);
    expect(markup).toContain('<path');
    expect(markup).not.toMatch(/[↑↓←→]/);
  }
});
