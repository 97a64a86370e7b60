import { readFileSync } from 'node:fs';
import path from 'node:path';

const css = readFileSync(path.join(__dirname, '../../../src/components/ui/tokens.css'), 'utf8');

type Tokens = Record<string, string>;
function tokensOf(selector: string): Tokens {
  const from = css.indexOf(`\n${selector} {`) + 1;
  const block = css.slice(from, css.indexOf('\n}', from));
  return Object.fromEntries([...block.matchAll(/--(\w+): (#[0-9a-f]{6});/g)].map((found) => [found[1]!, found[2]!]));
}
const paper = tokensOf(':root');
const dim = tokensOf(":root[data-room='dim']");

/** Relative luminance and contrast ratio as WCAG 2.2 defines them. */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const channel = parseInt(hex.slice(at, at + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
}
function contrast(one: string, other: string): number {
  const [light, dark] = [luminance(one), luminance(other)].sort((a, b) => b - a);
  return (light! + 0.05) / (dark! + 0.05);
}

describe('design, section 3: the colours are the published ones', () => {
  test.each([
    ['paper', paper, { desk: '#e5e6db', sheet: '#f9f9f3', ink: '#16211e', pen: '#27508f', madderw: '#f8dfdd' }],
    ['dim', dim, { desk: '#0c100e', sheet: '#131815', ink: '#d6d8c9', pen: '#9db9ea', madderw: '#371a1e' }],
  ])('%s', (_room, tokens, expected) => expect(tokens).toMatchObject(expected));
  test('both rooms name the same colours', () => expect(Object.keys(dim).sort()).toEqual(Object.keys(paper).sort()));
});

describe('design, section 3: contrast on sheet, margin, desk and own wash, to the printed digit', () => {
  const grounds = ['sheet', 'margin', 'desk'];
  test.each([
    ['paper ink', paper, 'ink', [15.6, 14.7, 13.1]],
    ['paper ink2', paper, 'ink2', [8.0, 7.5, 6.7]],
    ['paper ink3', paper, 'ink3', [5.7, 5.3, 4.7]],
    ['paper pen', paper, 'pen', [7.6, 7.1, 6.3, 6.5]],
    ['paper kelp', paper, 'kelp', [6.1, 5.8, 5.1, 5.2]],
    ['paper ochre', paper, 'ochre', [5.9, 5.5, 4.9, 5.1]],
    ['paper madder', paper, 'madder', [8.2, 7.8, 6.9, 6.9]],
    ['paper edge', paper, 'edge', [3.5, 3.3]],
    ['dim ink', dim, 'ink', [12.4, 11.7, 13.3]],
    ['dim ink2', dim, 'ink2', [8.1, 7.6, 8.6]],
    ['dim ink3', dim, 'ink3', [5.7, 5.3, 6.0]],
    ['dim pen', dim, 'pen', [9.0, 8.5, 9.6, 7.6]],
    ['dim kelp', dim, 'kelp', [10.6, 10.0, 11.3, 9.0]],
    ['dim ochre', dim, 'ochre', [8.3, 7.9, 8.9, 6.8]],
    ['dim madder', dim, 'madder', [6.2, 5.8, 6.6, 5.4]],
    ['dim edge', dim, 'edge', [4.1, 3.8]],
  ])('%s', (_name, tokens, colour, printed) => {
    // printed to one digit, two of them rounded up from just under the half
    printed.forEach((ratio, at) => {
      const ground = grounds[at] ?? `${colour}w`;
      expect(Math.abs(contrast(tokens[colour]!, tokens[ground]!) - ratio)).toBeLessThan(0.06);
    });
  });

  test.each([
    ['paper', paper],
    ['dim', dim],
  ])('%s: every text colour on every ground and wash is at least 4.5:1, control edges 3:1', (_room, tokens) => {
    const every = ['sheet', 'margin', 'desk', 'penw', 'kelpw', 'ochrew', 'madderw'];
    const low = ['ink', 'ink2', 'ink3'].flatMap((colour) =>
      every.map((ground) => ({ colour, ground, ratio: contrast(tokens[colour]!, tokens[ground]!) })),
    );
    expect(low.filter(({ ratio }) => ratio < 4.5)).toEqual([]);
    expect(contrast(tokens.edge!, tokens.sheet!)).toBeGreaterThanOrEqual(3);
    expect(contrast(tokens.edge!, tokens.margin!)).toBeGreaterThanOrEqual(3);
    // a primary button is ink with the sheet's colour as its text
    expect(contrast(tokens.sheet!, tokens.ink!)).toBeGreaterThanOrEqual(4.5);
    expect(contrast(tokens.sheet!, tokens.ink2!)).toBeGreaterThanOrEqual(4.5);
  });
});
