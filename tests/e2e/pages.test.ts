import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { afterAll, beforeAll, expect, test } from 'vitest';
import type { Browser, Page } from 'playwright-core';
import { z } from 'zod';
import { launchMillpond, makeStateFolder } from '#tests/support/launch-millpond.ts';
import type { Launched } from '#tests/support/launch-millpond.ts';
import { openBrowser, signIn } from '#tests/support/open-browser.ts';

/** Every page, wide and on a phone, light and dark: readable by everybody, nothing cut, nothing broken. */
let millpond: Launched;
let browser: Browser;
let removeState: () => Promise<void>;
const axeSource = readFileSync(
  createRequire(import.meta.url).resolve('axe-core/axe.min.js'),
  'utf8',
);

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

const pages = [
  '',
  '/board?open=C03',
  '/requests',
  '/requests/new',
  '/requests/1182',
  '/bookings',
  '/bookings/2385',
  '/loads/1184',
  '/equipment',
  '/equipment/M07',
  '/equipment/C03',
  '/metrology',
  '/metrology/calibrations/new?tag=M07',
  '/metrology/calibrations/5787',
  '/settings',
  '/help',
  '/help/marks',
  '/find?text=C03',
];

const violations = z.array(
  z.object({ id: z.string(), impact: z.string().nullable(), nodes: z.array(z.unknown()) }),
);

async function judge(page: Page) {
  await page.evaluate(axeSource);
  const found = violations.parse(
    await page.evaluate(`
      axe.run(document, { runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa'] })
        .then(({ violations }) => violations.map(({ id, impact, nodes }) => ({
          id, impact, nodes: nodes.slice(0, 3).map((node) => node.html.slice(0, 160)),
        })))`),
  );
  const overflow = z
    .number()
    .parse(
      await page.evaluate(
        'document.documentElement.scrollWidth - document.documentElement.clientWidth',
      ),
    );
  return { found, overflow };
}

test.each([
  [1440, 'dark'],
  [390, 'light'],
] as const)('at %i px, %s', async (width, colorScheme) => {
  const context = await browser.newContext({
    viewport: { width, height: 900 },
    colorScheme,
    // The policy of the pages forbids foreign script, and the judge is some.
    bypassCSP: true,
  });
  const page = await context.newPage();
  const faults: unknown[] = [];
  page.on('pageerror', (error) => {
    faults.push({ path: page.url(), error: error.message });
  });
  await signIn(page, millpond.url, 'marwhin', '/larkfen');
  for (const path of pages) {
    await page.goto(`${millpond.url}/larkfen${path}`, { waitUntil: 'networkidle' });
    const { found, overflow } = await judge(page);
    if (found.length > 0 || overflow > 0) {
      faults.push({ path, overflow, found });
    }
    expect(await page.title()).toMatch(/ · Millpond$/);
  }
  await context.close();
  expect(faults).toEqual([]);
});
