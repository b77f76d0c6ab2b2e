import { performance } from 'node:perf_hooks';
import { confirmBooking } from '#shared/contracts/bookings.contract.ts';
import { findOffers } from '#shared/contracts/offers.contract.ts';
import { getRequest, listRequests } from '#shared/contracts/requests.contract.ts';
import { createTestClient } from '#tests/support/api-client.ts';
import { launchMillpond, makeStateFolder } from '#tests/support/launch-millpond.ts';
import { openBrowser, signIn } from '#tests/support/open-browser.ts';
import { percentile, report } from './report.ts';

// The running product on the demo, as a person meets it: from `npm start` on.
const state = await makeStateFolder();
const first = await launchMillpond(state.folder);
report({ name: 'first start, packages present', value: first.startedInMs / 1000, unit: 's' });
await first.stop();
const millpond = await launchMillpond(state.folder);
report({ name: 'second start', value: millpond.startedInMs / 1000, unit: 's' });

try {
  const scheduler = await createTestClient(millpond.url, 'osmery');
  const { items } = await scheduler.call(listRequests, {
    params: { site: 'larkfen' },
    query: { state: 'submitted', limit: '200' },
  });
  const requests = await Promise.all(
    items.map(({ id }) => scheduler.call(getRequest, { params: { site: 'larkfen', id } })),
  );
  const lots = requests.flatMap((request) =>
    request.lots
      .filter((lot) => lot.bookingId === null)
      .map((lot) => ({ request, params: { site: 'larkfen', id: request.id, lotId: lot.id } })),
  );

  const offerTimes: number[] = [];
  const commitTimes: number[] = [];
  for (const round of [0, 1, 2]) {
    for (const { params } of lots) {
      const begin = performance.now();
      await scheduler.call(findOffers, { params });
      if (round > 0) {
        offerTimes.push(performance.now() - begin);
      }
    }
  }
  report({
    name: 'offers for a lot on the demo, p95',
    value: percentile(offerTimes, 95),
    unit: 'ms',
    limit: { max: 300 },
  });
  report({
    name: 'offers for a lot on the demo, p50',
    value: percentile(offerTimes, 50),
    unit: 'ms',
  });

  for (const { request, params } of lots) {
    const { offers } = await scheduler.call(findOffers, { params });
    const current = await scheduler.call(getRequest, {
      params: { site: 'larkfen', id: request.id },
    });
    const [offer] = offers;
    if (offer !== undefined) {
      const begin = performance.now();
      await scheduler.call(confirmBooking, {
        params: { site: 'larkfen' },
        body: {
          requestId: request.id,
          lotId: params.lotId,
          requestVersion: current.version,
          placement: offer.placement,
        },
      });
      commitTimes.push(performance.now() - begin);
    }
  }
  report({
    name: `booking with all checks, p50 of ${commitTimes.length}`,
    value: percentile(commitTimes, 50),
    unit: 'ms',
  });

  const browser = await openBrowser();
  const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
  await signIn(page, millpond.url, 'osmery', '/larkfen');
  const paints: number[] = [];
  for (let round = 0; round < 6; round += 1) {
    await page.goto(`${millpond.url}/larkfen/help`, { waitUntil: 'networkidle' });
    const begin = performance.now();
    await page.goto(`${millpond.url}/larkfen/board`, { waitUntil: 'commit' });
    await page.waitForSelector('.fc-event svg, .mp-board-tide svg', { state: 'visible' });
    if (round > 0) {
      paints.push(performance.now() - begin);
    }
  }
  await browser.close();
  report({
    name: 'first paint of the board, from the address to drawn rows, p50',
    value: percentile(paints, 50) / 1000,
    unit: 's',
    limit: { max: 1 },
  });
} finally {
  await millpond.stop();
  await state.remove();
}
