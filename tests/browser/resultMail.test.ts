import type { Browser } from 'playwright-core';
import { launchBrowser, testOrigin } from '../support/browser';
import { openAs, type Window } from './people';

const SLOW = 120_000;
let browser: Browser;
let manager: Window;
beforeAll(async () => {
  browser = await launchBrowser();
  manager = await openAs(browser, 'anselm');
}, 60_000);
afterAll(() => browser.close());

async function sampleId({ context }: Window, code: string): Promise<string> {
  const answer = await context.request.get(`${testOrigin()}/api/samples?limit=200`);
  const { items } = (await answer.json()) as { items: { id: string; code: string }[] };
  return items.find((item) => item.code === code)!.id;
}

test(
  'the demo’s two result e-mails stand on the sample: one sent, one refused with the mail server’s words',
  async () => {
    const { page } = manager;
    await page.goto(`${testOrigin()}/samples/${await sampleId(manager, 'S-048')}`);
    const rows = page.getByRole('table', { name: 'Result e-mails of this sample' }).locator('tbody tr');
    await rows.first().waitFor();
    const said = (await rows.allInnerTexts()).join('\n');
    expect(said).toMatch(/sent .*15:40/);
    expect(said).toContain('refused: 552 5.2.2');
  },
  SLOW,
);

test(
  'a manager sees exactly what is sent, sends it, and the sheet shows that it waits or is on its way',
  async () => {
    const { page, context } = manager;
    const id = await sampleId(manager, 'S-047');
    await page.goto(`${testOrigin()}/samples/${id}`);
    const count = async () => {
      const answer = await context.request.get(`${testOrigin()}/api/result-mails?sampleId=${id}&limit=200`);
      return ((await answer.json()) as { items: { text: string; state: { label: string }; to: { name: string } }[] })
        .items;
    };
    const before = (await count()).length;
    await page.getByRole('button', { name: /^Send a result/ }).click();
    const form = page.getByRole('form', { name: 'Send a result' });
    expect(await form.getByRole('checkbox').count()).toBeGreaterThanOrEqual(2);
    await form.getByRole('button', { name: 'Look at the e-mail' }).click();
    await form.getByText('The e-mail names at least one designer.').waitFor();
    await form.getByLabel('Teo Lind').check();
    const state = await form.getByLabel('Result of state').locator('option', { hasText: 'M2, ' }).getAttribute('value');
    await form.getByLabel('Result of state').selectOption(state!);
    await form.getByLabel('What you add, if anything').fill('The hump is what is left.');
    await form.getByRole('button', { name: 'Look at the e-mail' }).click();
    const shown = page.getByRole('region', { name: 'The e-mail as it will be sent' });
    await shown.getByText('Result of LD-40 M2, job HL-').waitFor();
    expect(await shown.getByText('Teo Lind, teo.lind@pellorrin.example').count()).toBe(1);
    const words = await shown.locator('pre').innerText();
    expect(words).toMatch(/^Over by 6\.\d dB at 144\.0\d\d MHz, enclosure\. AC mains is under\.$/m);
    expect(words).toMatch(/^Left out: .*trial runs/m);
    await shown.getByRole('button', { name: 'Approve and send to Teo Lind' }).dblclick();
    await page.getByText('The result is on its way to Teo Lind').waitFor();
    const sent = await count();
    expect(sent.length).toBe(before + 1);
    expect(sent[0]).toMatchObject({ to: { name: 'Teo Lind' }, state: { label: 'M2' } });
    expect(sent[0]!.text.trim()).toBe(words.trim());
    const row = page.getByRole('table', { name: 'Result e-mails of this sample' }).locator('tbody tr').first();
    await row.getByText(/^(queued|sending|sent \d\d:\d\d)/).waitFor();
  },
  SLOW,
);

test(
  'a technician reads what was sent and sends nothing; a designer sees none of it',
  async () => {
    const technician = await openAs(browser, 'mira');
    const id = await sampleId(technician, 'S-048');
    await technician.page.goto(`${testOrigin()}/samples/${id}`);
    await technician.page.getByRole('table', { name: 'Result e-mails of this sample' }).waitFor();
    expect(await technician.page.getByRole('button', { name: /^Send a result/ }).count()).toBe(0);
    await technician.context.close();
    const designer = await openAs(browser, 'jory');
    await designer.page.goto(`${testOrigin()}/samples/${id}`);
    await designer.page.getByRole('heading', { level: 1 }).waitFor();
    expect(await designer.page.getByText('Result e-mail').count()).toBe(0);
    await designer.context.close();
  },
  SLOW,
);
