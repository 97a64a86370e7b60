import { renderToStaticMarkup } from 'react-dom/server';
import { ProblemMessage } from '@/components/forms/ProblemMessage';
import { UNREACHABLE, type Problem } from '@/components/forms/problem';

const text = (problem: Problem | null) =>
  renderToStaticMarkup(<ProblemMessage problem={problem} />).replace(/<[^>]+>/g, '');
const refused: Problem = { ...UNREACHABLE, status: 400, title: 'Some entries need another look', detail: null };

test('no problem draws nothing', () => expect(renderToStaticMarkup(<ProblemMessage problem={null} />)).toBe(''));

test('what happened in bold, then the next step, then what belongs to no field', () =>
  expect(
    text({
      ...refused,
      detail: 'One is missing.',
      errors: [
        { pointer: '', message: 'two files at once' },
        { pointer: '/a', message: 'stands at its field' },
      ],
    }),
  ).toBe('Some entries need another look. One is missing. two files at once.'));

test('a detail that repeats the title is said once', () =>
  expect(text({ ...refused, detail: 'Some entries need another look.' })).toBe('Some entries need another look.'));

test('only work that may be lost interrupts a screen reader', () => {
  expect(renderToStaticMarkup(<ProblemMessage problem={UNREACHABLE} />)).toContain('role="alert"');
  expect(renderToStaticMarkup(<ProblemMessage problem={refused} />)).toContain('role="status"');
});
