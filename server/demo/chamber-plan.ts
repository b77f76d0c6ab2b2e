import type { CellFormat } from '#shared/domain/hold-estimate/types.ts';
import type { SiteKey } from './sites.ts';

/** What a chamber's log shows: quiet, moving too much, or read too coarsely to tell. */
export type ChamberManner = 'quiet' | 'restless' | 'coarse';

export type ChamberPlan = {
  readonly tag: string;
  readonly site: SiteKey;
  readonly room: string;
  readonly model: string;
  readonly positions: number;
  /** How the positions are wired together, from the first on. */
  readonly wiring: readonly number[];
  readonly formats: readonly CellFormat[];
  readonly maxAh: number;
  readonly protection: number;
  readonly maxEnergyWh: number;
  readonly holder: string;
  readonly holderFactor: number;
  readonly spanC: readonly [number, number];
  readonly rampKPerMin: number;
  readonly strict: boolean;
  readonly manner: ChamberManner;
  /** Set temperatures at which its log was judged. */
  readonly loggedC: readonly number[];
  /** Highest temperature at which holds may run with nobody present; null: never permitted. */
  readonly unattendedC: number | null;
};

const small: readonly CellFormat[] = ['coin', 'pouch'];
const round: readonly CellFormat[] = ['18650', '21700'];
const big: readonly CellFormat[] = ['prismatic', 'pouch'];

const usual = {
  spanC: [10, 80],
  rampKPerMin: 1,
  strict: true,
  manner: 'quiet',
  loggedC: [25, 45, 60],
  unattendedC: 60,
} as const;
const cylinderBlock = { holder: 'spring block, 4-wire', holderFactor: 1.3 };
const plate = { holder: 'plate with clamps, 4-wire', holderFactor: 1.4 };
const tray = { holder: 'tray with spring contacts', holderFactor: 1.2 };

export const chamberPlans: readonly ChamberPlan[] = [
  {
    ...usual,
    ...tray,
    tag: 'C01',
    site: 'larkfen',
    room: 'Room 1',
    model: 'climate cabinet, 240 litre',
    positions: 12,
    wiring: [6, 4, 2],
    formats: small,
    maxAh: 2,
    protection: 3,
    maxEnergyWh: 120,
  },
  {
    ...usual,
    ...tray,
    tag: 'C02',
    site: 'larkfen',
    room: 'Room 1',
    model: 'climate cabinet, 240 litre',
    positions: 10,
    wiring: [4, 4, 2],
    formats: ['coin', 'pouch', '18650'],
    maxAh: 4,
    protection: 4,
    maxEnergyWh: 200,
    loggedC: [25, 45],
  },
  {
    ...usual,
    ...cylinderBlock,
    tag: 'C03',
    site: 'larkfen',
    room: 'Room 2',
    model: 'temperature cabinet, 400 litre',
    positions: 12,
    wiring: [4, 4, 4],
    formats: round,
    maxAh: 6,
    protection: 5,
    maxEnergyWh: 300,
    loggedC: [15, 25, 35, 45, 60],
  },
  {
    ...usual,
    ...cylinderBlock,
    tag: 'C04',
    site: 'larkfen',
    room: 'Room 2',
    model: 'temperature cabinet, 400 litre',
    positions: 12,
    wiring: [6, 6],
    formats: round,
    maxAh: 6,
    protection: 5,
    maxEnergyWh: 300,
  },
  {
    ...usual,
    ...cylinderBlock,
    tag: 'C05',
    site: 'larkfen',
    room: 'Room 2',
    model: 'liquid-jacket cabinet, 160 litre',
    positions: 10,
    wiring: [4, 4, 1, 1],
    formats: round,
    maxAh: 6,
    protection: 4,
    maxEnergyWh: 250,
    strict: false,
    spanC: [10, 50],
    loggedC: [25],
    unattendedC: 45,
  },
  {
    ...usual,
    ...cylinderBlock,
    tag: 'C06',
    site: 'larkfen',
    room: 'Room 3',
    model: 'safety cabinet, 600 litre',
    positions: 8,
    wiring: [4, 2, 2],
    formats: ['4680', '21700'],
    maxAh: 30,
    protection: 5,
    maxEnergyWh: 900,
    loggedC: [25, 45],
  },
  {
    ...usual,
    ...plate,
    tag: 'C07',
    site: 'larkfen',
    room: 'Room 3',
    model: 'safety cabinet, 1000 litre',
    positions: 8,
    wiring: [4, 2, 1, 1],
    formats: big,
    maxAh: 70,
    protection: 5,
    maxEnergyWh: 2000,
    loggedC: [25, 35, 45],
  },
  {
    ...usual,
    ...plate,
    tag: 'C08',
    site: 'larkfen',
    room: 'Room 3',
    model: 'walk-in safety chamber',
    positions: 6,
    wiring: [2, 2, 2],
    formats: ['prismatic'],
    maxAh: 320,
    protection: 6,
    maxEnergyWh: 6000,
    rampKPerMin: 0.5,
    spanC: [10, 60],
    loggedC: [25, 45],
    unattendedC: 45,
  },
  {
    ...usual,
    ...cylinderBlock,
    tag: 'C09',
    site: 'larkfen',
    room: 'Room 2',
    model: 'forced-air oven, 250 litre',
    positions: 10,
    wiring: [6, 4],
    formats: [...round, 'pouch'],
    maxAh: 6,
    protection: 4,
    maxEnergyWh: 250,
    manner: 'restless',
    spanC: [20, 85],
    rampKPerMin: 2,
    loggedC: [25, 60],
  },
  {
    ...usual,
    ...tray,
    tag: 'C10',
    site: 'larkfen',
    room: 'Room 1',
    model: 'climate cabinet, 180 litre',
    positions: 10,
    wiring: [4, 4, 2],
    formats: [...round, 'pouch'],
    maxAh: 6,
    protection: 3,
    maxEnergyWh: 150,
    manner: 'coarse',
    loggedC: [25, 45],
    unattendedC: null,
  },
  {
    ...usual,
    ...cylinderBlock,
    tag: 'C11',
    site: 'otterholm',
    room: 'Hall A',
    model: 'temperature cabinet, 400 litre',
    positions: 14,
    wiring: [6, 4, 4],
    formats: round,
    maxAh: 6,
    protection: 5,
    maxEnergyWh: 350,
  },
  {
    ...usual,
    ...tray,
    tag: 'C12',
    site: 'otterholm',
    room: 'Hall A',
    model: 'climate cabinet, 240 litre',
    positions: 10,
    wiring: [6, 4],
    formats: small,
    maxAh: 2,
    protection: 3,
    maxEnergyWh: 100,
    loggedC: [25, 45],
  },
  {
    ...usual,
    ...plate,
    tag: 'C13',
    site: 'otterholm',
    room: 'Hall B',
    model: 'safety cabinet, 1000 litre',
    positions: 8,
    wiring: [4, 4],
    formats: big,
    maxAh: 120,
    protection: 5,
    maxEnergyWh: 3000,
    loggedC: [25, 45],
  },
  {
    ...usual,
    ...cylinderBlock,
    tag: 'C14',
    site: 'otterholm',
    room: 'Hall B',
    model: 'forced-air oven, 250 litre',
    positions: 10,
    wiring: [6, 2, 2],
    formats: [...round, '4680'],
    maxAh: 30,
    protection: 5,
    maxEnergyWh: 700,
    manner: 'coarse',
    spanC: [20, 85],
    rampKPerMin: 2,
    loggedC: [25, 60],
  },
];
