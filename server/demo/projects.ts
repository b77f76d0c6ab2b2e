import { stamped, type DemoContext } from './demo-context.ts';
import { dayMs } from './demo-days.ts';
import type { People } from './people.ts';
import type { SiteKey } from './sites.ts';

export type DemoProject = {
  readonly id: number;
  readonly code: string;
  readonly site: SiteKey;
  readonly requesterIds: readonly number[];
  /** Families of cell types it brings. */
  readonly types: readonly string[];
};

type ProjectLine = {
  readonly code: string;
  readonly name: string;
  readonly customer: string | null;
  readonly site: SiteKey;
  readonly members: readonly (keyof People)[];
  readonly types: readonly string[];
};
const lines: readonly ProjectLine[] = [
  {
    code: 'HEDGE',
    name: 'Hedgerow pack, incoming cells',
    customer: 'Wexmarsh Mobility',
    site: 'larkfen',
    members: ['engineer', 'secondEngineer'],
    types: ['CY50', 'CY48', 'CY34'],
  },
  {
    code: 'SILT',
    name: 'Silt: slow leakers after formation',
    customer: null,
    site: 'larkfen',
    members: ['engineer'],
    types: ['CY25', 'CY35', 'PX20', 'PX10'],
  },
  {
    code: 'ANVIL',
    name: 'Anvil traction modules',
    customer: 'Harrowtide Machines',
    site: 'larkfen',
    members: ['secondEngineer', 'engineer'],
    types: ['NP35', 'TP23', 'LP50', 'NP12'],
  },
  {
    code: 'BEACON',
    name: 'Beacon stationary storage',
    customer: 'Pellwick Grid Storage',
    site: 'larkfen',
    members: ['secondEngineer'],
    types: ['LF280', 'NP200', 'LF105'],
  },
  {
    code: 'WREN',
    name: 'Wren wearables',
    customer: 'Tansy & Oake Instruments',
    site: 'larkfen',
    members: ['engineer'],
    types: ['CX20', 'CX45', 'PX05', 'PX12T'],
  },
  {
    code: 'DRUM',
    name: 'Drum: large cylinders',
    customer: 'Wexmarsh Mobility',
    site: 'larkfen',
    members: ['engineer', 'secondEngineer'],
    types: ['CL20', 'CL23', 'CL26'],
  },
  {
    code: 'MAPLE',
    name: 'Maple tool packs',
    customer: 'Corrigate Tools',
    site: 'otterholm',
    members: ['otterholmEngineer'],
    types: ['CY25', 'CY48', 'CY50', 'CF20', 'CX45', 'PX20'],
  },
  {
    code: 'FERRY',
    name: 'Ferry drive, ageing study',
    customer: 'Skerrow Marine',
    site: 'otterholm',
    members: ['otterholmEngineer', 'secondEngineer'],
    types: ['NP35', 'LF105', 'LP50', 'NP12', 'CL23'],
  },
];

export function layProjects(context: DemoContext, people: People): readonly DemoProject[] {
  return lines.map((line, index) => {
    const id = context.number('projects');
    const made = stamped(context.nowMs - (880 - index * 30) * dayMs);
    context.rows.projects.push({
      id,
      code: line.code,
      name: line.name,
      customer: line.customer,
      costCentre: String(7100 + index * 15),
      ...made,
    });
    const requesterIds = line.members.map((member) => people[member]);
    for (const personId of requesterIds) {
      context.rows.projectMembers.push({ projectId: id, personId, createdAt: made.createdAt });
    }
    return { id, code: line.code, site: line.site, requesterIds, types: line.types };
  });
}
