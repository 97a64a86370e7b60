import { renderToStaticMarkup } from 'react-dom/server';
import { Sheet } from '@/components/shell/Sheet';
import { SheetHeader } from '@/components/shell/SheetHeader';
import { SignInFrame } from '@/components/shell/SignInFrame';
import { TopLine } from '@/components/shell/TopLine';

jest.mock('next/navigation', () => ({ usePathname: () => '/sweeps/abc' }));

const sections = [
  { href: '/jobs', name: 'Jobs' },
  { href: '/sweeps', name: 'Sweeps', onPhone: true },
  { href: '/equipment', name: 'Equipment', waiting: { state: 'decide' as const, count: 1, says: '1 due' } },
];
const top = renderToStaticMarkup(
  <TopLine sections={sections} person={{ name: 'Mira Solt', part: 'technician' }} room="dim" menu={<b>menu</b>} />,
);
const sheet = renderToStaticMarkup(
  <Sheet
    header={<SheetHeader title="Lumen strip driver LD-40" state={{ label: 'M2' }} finding={{ verdict: 'under' }} />}
    margin={[
      { id: 'working', title: 'Working', children: 'sum' },
      { id: 'notes', title: 'Notes', count: 2, summary: '2 notes', open: true, children: 'twisted' },
      { id: 'custody', title: 'Custody', summary: 'on shelf 4', children: 'moves' },
    ]}
    keys={[{ keys: ['ArrowUp', 'ArrowDown'], does: 'rows' }]}
  >
    body
  </Sheet>,
);
const sign = renderToStaticMarkup(
  <SignInFrame title="Sign in" labName="Harrow Lane EMC Bench" room="paper" foot="foot">
    form
  </SignInFrame>,
);

test('the current section is marked for everybody, and what waits is said after its name', () => {
  expect(top).toMatch(/href="\/sweeps"[^>]*aria-current="page"|aria-current="page"[^>]*href="\/sweeps"/);
  expect(top.match(/aria-current/g)).toHaveLength(1);
  expect(top.replace(/<[^>]+>/g, '')).toContain('Equipment1, 1 due');
});

test('the first stop leads past the names to the sheet', () => {
  expect(top.indexOf('href="#sheet"')).toBeLessThan(top.indexOf('href="/jobs"'));
  expect(sheet).toContain('<main id="sheet"');
  expect(sign).toMatch(/<main[^>]*id="sheet"/);
});

test('the room word offers the other room, as the server knows it', () => expect(top).toContain('>Paper</button>'));

test('a key is shown for finding only where there is something to find', () => {
  expect(top).not.toContain('data-key="/"');
  const found = renderToStaticMarkup(
    <TopLine sections={[]} person={{ name: 'A', part: 'b' }} room="paper" findHref="/find" />,
  );
  expect(found).toContain('data-key="/"');
});

describe('the column', () => {
  test('is a region named by its parts only', () =>
    expect(sheet).toMatch(/<aside[^>]*aria-label="Working, Notes, Custody"/));
  test('what is folded shows its summary and its body is out of reach', () => {
    const custody = sheet.slice(sheet.indexOf('data-section="custody"'));
    expect(custody).toContain('aria-expanded="false"');
    expect(custody).toContain('on shelf 4');
    expect(custody).toMatch(/<div[^>]*inert=""[^>]*><div[^>]*>moves/);
  });
  test('what is open shows its body and not its summary', () => {
    const notes = sheet.slice(sheet.indexOf('data-section="notes"'), sheet.indexOf('data-section="custody"'));
    expect(notes).toContain('aria-expanded="true"');
    expect(notes).not.toContain('2 notes');
  });
  test('a part without a summary does not fold', () => {
    const working = sheet.slice(sheet.indexOf('data-section="working"'), sheet.indexOf('data-section="notes"'));
    expect(working).not.toContain('aria-expanded');
    expect(working).toContain('data-tie="heading"');
  });
  test('a sheet without parts has none', () => expect(renderToStaticMarkup(<Sheet>x</Sheet>)).not.toContain('<aside'));
});

test('one h1 on a sheet, parts are h2', () => {
  expect(sheet.match(/<h1/g)).toHaveLength(1);
  expect(sheet.match(/<h2/g)).toHaveLength(3);
});

test('nothing drawn on the server carries a style attribute: the content security policy would drop it', () => {
  for (const markup of [top, sheet, sign]) expect(markup).not.toMatch(/\sstyle=/);
});
