import { stamped, type DemoContext } from './demo-context.ts';
import { dayMs } from './demo-days.ts';
import type { People } from './people.ts';
import type { Sites } from './sites.ts';

/** What most panels of both sites have, so that an estimate comes near the offers that follow it. */
const commonLeadOhm = 0.06;

/** The policies that the sites have set away from their defaults. */
export function layPolicies(context: DemoContext, sites: Sites, people: People): void {
  for (const site of [sites.larkfen, sites.otterholm]) {
    context.rows.settings.push({
      id: context.number('settings'),
      siteId: site.id,
      key: 'referenceLeadResistanceOhm',
      value: commonLeadOhm,
      changedById: people.manager,
      ...stamped(context.nowMs - 1090 * dayMs),
    });
  }
}
