import { afterAll, beforeAll, expect, test } from 'vitest';
import { DateTime } from 'luxon';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { z } from 'zod';
import { launchMillpond, makeStateFolder } from '#tests/support/launch-millpond.ts';
import type { Launched } from '#tests/support/launch-millpond.ts';
import { openBrowser, signIn } from '#tests/support/open-browser.ts';

/**
 * The main job as three people do it, over everything that `npm start` starts: real server, worker,
 * database, sign-in and mail, the built client in Chromium. The tests of this file build on each other.
 */
let millpond: Launched;
let browser: Browser;
let removeState: () => Promise<void>;
const faults: string[] = [];

beforeAll(async () => {
  const state = await makeStateFolder();
  removeState = state.remove;
  millpond = await launchMillpond(state.folder);
  browser = await openBrowser();
});
afterAll(async () => {
  await browser.close();
  await millpond.stop();
  await removeState();
});

async function openAs(sub: string, path: string): Promise<{ context: BrowserContext; page: Page }> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
  const page = await context.newPage();
  page.on('pageerror', (error) => {
    faults.push(`${sub} ${path}: ${error.message}`);
  });
  page.on('response', (response) => {
    if (response.status() >= 500) {
      faults.push(`${sub} ${response.url()}: ${response.status()}`);
    }
  });
  await signIn(page, millpond.url, sub, path);
  return { context, page };
}

const neededBy = DateTime.now().plus({ days: 28 }).toFormat("yyyy-MM-dd'T'12:00");
let requestPath = '';
let bookingPath = '';

test('an engineer asks for eight 21700 cells, sees how long it takes, and proposes a slot', async () => {
  const { context, page } = await openAs('hallowe', '/larkfen/requests/new');
  await page
    .getByLabel('Cell type')
    .selectOption({ label: await labelOf(page, 'Cell type', 'CY50, 21700') });
  await page.getByLabel('Project').selectOption('Hedgerow pack, incoming cells');
  await page.getByLabel('Cells', { exact: true }).fill('8');
  await page.getByLabel('State of charge').fill('50');
  await page.getByLabel(/Rested since/).fill('2026-01-05T08:00');
  await page.getByText('Safe (90 in 100)').waitFor();
  const estimate = page.getByRole('region', { name: 'Lot 1' });
  await estimate.getByRole('cell', { name: 'hold until settled' }).waitFor();

  await page.getByLabel(/Needed by/).fill(neededBy);
  await page.getByRole('button', { name: 'Save and look for slots' }).click();
  await page.getByRole('heading', { level: 1, name: /^Request \d+$/ }).waitFor();
  requestPath = new URL(page.url()).pathname;

  await page.getByRole('button', { name: 'Ask for this' }).first().click();
  await page.getByRole('dialog').getByRole('button', { name: 'Ask for this' }).click();
  await page.getByText('It reserves nothing; a scheduler books.').waitFor();
  await page.getByText('It is with the schedulers.').waitFor();
  await context.close();
});

test('a scheduler finds the proposal under what waits, books it, and the board shows it', async () => {
  const { context, page } = await openAs('osmery', '/larkfen');
  const number = /\d+$/.exec(requestPath)?.[0] ?? '';
  const more = page.getByRole('button', { name: /^Show \d+ more$/ });
  await page.getByRole('heading', { name: 'Waits for you' }).waitFor();
  if (await more.isVisible()) {
    await more.click();
  }
  await page
    .getByRole('link', { name: `Look and book: Request ${number} proposes a slot` })
    .click();
  await page.getByRole('button', { name: 'Book this' }).first().click();
  await page
    .getByRole('dialog')
    .getByRole('button', { name: /^Book in C\d\d$/ })
    .click();
  await page.getByRole('heading', { level: 1, name: /^Booking \d+$/ }).waitFor();
  bookingPath = new URL(page.url()).pathname;
  // Cells asked by number have not come yet: the booking stands, and lapses if they never do.
  await page.getByText('tentative', { exact: true }).waitFor();
  await page.getByText('Released if cells are not here').waitFor();
  expect(await page.getByRole('row', { name: /^pass/ }).count()).toBeGreaterThan(15);

  const chamber = await page
    .getByRole('link', { name: /^C\d\d$/ })
    .first()
    .innerText();
  const start = await page.locator('dt:text-is("From") + dd').innerText();
  const day = DateTime.fromFormat(start, 'ccc d LLL HH:mm', { locale: 'en-GB' }).toISODate() ?? '';
  await page.goto(`${millpond.url}/larkfen/board?day=${day}&open=${chamber}`);
  const booking = /\d+$/.exec(bookingPath)?.[0] ?? '';
  await page.locator(`[title*="${booking}"], [aria-label*="${booking}"]`).first().waitFor();
  await context.close();
});

test('a metrologist records a calibration and a second one signs; the instrument is in date again', async () => {
  const first = await openAs('fennick', '/larkfen/metrology/calibrations/new?tag=M07');
  const record = first.page;
  await record.getByLabel('Calibrated by').fill('in-house');
  await record.getByLabel('Certificate number').fill('LF-E2E-1');
  await record.setInputFiles('input[type=file]', {
    name: 'certificate.pdf',
    mimeType: 'application/pdf',
    buffer: Buffer.from('%PDF-1.7\n1 0 obj<<>>endobj\ntrailer<<>>\n%%EOF'),
  });
  await record.getByText('certificate.pdf has arrived.').waitFor();
  await record.getByRole('button', { name: 'Send for approval' }).click();
  await record.getByText('awaits the second signature').waitFor();
  const path = new URL(record.url()).pathname;
  const own = record.getByRole('button', { name: /^Approve/ });
  expect(await own.getAttribute('aria-disabled')).toBe('true');
  await first.context.close();

  const second = await openAs('dunmarle', path);
  await second.page.getByRole('button', { name: 'Approve' }).click();
  await second.page.getByRole('dialog').getByRole('button', { name: 'Approve' }).click();
  await second.page.getByText('Approved.').waitFor();
  await second.page.goto(`${millpond.url}/larkfen/equipment/M07`);
  await second.page.getByText('in date').first().waitFor();
  await second.context.close();
});

test('the worker has sent the reminders of the day, and the stand-in shows them', async () => {
  const calls = z.array(z.looseObject({ subject: z.string().nullish() }));
  let mails: z.output<typeof calls> = [];
  for (let round = 0; round < 60 && mails.length === 0; round += 1) {
    mails = calls.parse(await (await fetch(`${millpond.mailUrl}/__calls`)).json());
    await new Promise((resolve) => setTimeout(resolve, 1000));
  }
  expect(mails.length).toBeGreaterThan(0);
});

test('an engineer of another project sees only that the place is taken', async () => {
  const { context, page } = await openAs('vessant', '/otterholm');
  await page.getByRole('heading', { name: 'Waits for you' }).waitFor();
  const answer = await page.request.get(
    `${millpond.url}/api/sites/larkfen/requests/${/\d+$/.exec(requestPath)?.[0] ?? ''}`,
  );
  expect(answer.status()).toBe(404);
  await context.close();
});

test('nothing failed in any page and no answer was a server error', () => {
  expect(faults).toEqual([]);
});

async function labelOf(page: Page, field: string, start: string): Promise<string> {
  const option = page.getByLabel(field).locator('option', { hasText: start });
  await option.first().waitFor({ state: 'attached' });
  return option.first().innerText();
}
