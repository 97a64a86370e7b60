import { renderToStaticMarkup } from 'react-dom/server';
import CalculatorPage from '@/app/(lab)/calculator/page';

const requireActor = jest.fn(async () => ({}));
jest.mock('@/app/requireActor', () => ({ requireActor: () => requireActor() }));

const markup = async (query: Record<string, string | string[]>) =>
  renderToStaticMarkup(await CalculatorPage({ searchParams: Promise.resolve(query) }));

test('the page asks who is there and opens what the address names', async () => {
  const html = await markup({ pane: 'eirp', have: 'eirp', level: '-10', d: ['3', '10'] });
  expect(requireActor).toHaveBeenCalledTimes(1);
  expect(html).toContain('85.23 dBµV/m');
});

test('somebody who is not signed in sees nothing of it', async () => {
  requireActor.mockRejectedValueOnce(new Error('to the sign-in'));
  await expect(markup({})).rejects.toThrow('to the sign-in');
});
