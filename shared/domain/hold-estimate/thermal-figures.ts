import type { BodyShape } from './thermal-time-constant.ts';

export type ThermalFigures = {
  readonly key: string;
  readonly label: string;
  readonly massKg: number;
  readonly surfaceM2: number;
  /** Half the thickness of a plate, or the radius of a cylinder, m. */
  readonly characteristicLengthM: number;
  readonly shape: BodyShape;
  readonly source: string;
};

const source = 'engineering estimate of mass and size';

/** Mass, surface and inner length of the usual formats. */
export const thermalFigures = {
  coin: {
    key: 'coin',
    label: 'Coin cell 2032',
    massKg: 0.0027,
    surfaceM2: 8.3e-4,
    characteristicLengthM: 0.0016,
    shape: 'plate',
    source,
  },
  smallPouch: {
    key: 'small-pouch',
    label: 'Pouch cell of 1 Ah',
    massKg: 0.02,
    surfaceM2: 5.15e-3,
    characteristicLengthM: 0.0025,
    shape: 'plate',
    source,
  },
  cylindrical18650: {
    key: '18650',
    label: 'Cylindrical cell 18650',
    massKg: 0.047,
    surfaceM2: 4.3e-3,
    characteristicLengthM: 0.009,
    shape: 'cylinder',
    source,
  },
  cylindrical21700: {
    key: '21700',
    label: 'Cylindrical cell 21700',
    massKg: 0.069,
    surfaceM2: 5.35e-3,
    characteristicLengthM: 0.0105,
    shape: 'cylinder',
    source,
  },
  cylindrical4680: {
    key: '4680',
    label: 'Cylindrical cell 4680',
    massKg: 0.355,
    surfaceM2: 1.489e-2,
    characteristicLengthM: 0.023,
    shape: 'cylinder',
    source,
  },
  prismatic: {
    key: 'prismatic',
    label: 'Prismatic cell of 60 Ah, 148 × 91 × 27 mm',
    massKg: 1,
    surfaceM2: 3.984e-2,
    characteristicLengthM: 0.0135,
    shape: 'plate',
    source,
  },
  largePrismatic: {
    key: 'large-prismatic',
    label: 'Prismatic cell of 280 Ah, 174 × 207 × 72 mm',
    massKg: 5.4,
    surfaceM2: 0.1269,
    characteristicLengthM: 0.036,
    shape: 'plate',
    source,
  },
} as const satisfies Record<string, ThermalFigures>;

/** Specific heat of a cell, J/(kg·K); published 852-1080 (Zheng 2024, BPX example sets, Ai 2020). */
export const cellHeatCapacityJPerKgK = 1000;

/** Film coefficient in a fan chamber, W/(m²·K); common practice 10-40, the weakest input of all. */
export const chamberFilmCoefficientWPerM2K = 20;

/** Conductivity across a cell, W/(m·K); engineering estimate 0.5-1 through a plate. */
export const cellConductivityWPerMK = 1;
