/** Capacitance by capacity computed from published open-circuit curves, local slope over ±2.5 %. */
export type PublishedCapacitance = {
  readonly label: string;
  readonly source: string;
  readonly points: readonly {
    readonly stateOfChargePct: number;
    readonly capacitanceFPerAh: number;
  }[];
};

function rows(values: readonly (readonly [number, number])[]): PublishedCapacitance['points'] {
  return values.map(([stateOfChargePct, capacitanceFPerAh]) => ({
    stateOfChargePct,
    capacitanceFPerAh,
  }));
}

/** Four published cells; they show how far the capacitance moves with the state of charge. */
export const publishedCapacitance: readonly PublishedCapacitance[] = [
  {
    label: 'NMC811 / graphite-SiOx, 5 Ah 21700',
    source: 'Chen 2020, J. Electrochem. Soc. 167 080534',
    points: rows([
      [20, 4160],
      [30, 3361],
      [40, 5234],
      [50, 4022],
      [60, 3579],
      [80, 3486],
      [90, 12_300],
    ]),
  },
  {
    label: 'NMC111 / graphite, 12.5 Ah pouch',
    source: 'BPX example set',
    points: rows([
      [20, 4476],
      [30, 8581],
      [40, 10_604],
      [50, 6998],
      [60, 4766],
      [80, 2994],
    ]),
  },
  {
    label: 'LCO / graphite, 2.28 Ah pouch',
    source: 'Ai 2020, J. Electrochem. Soc. 167 013512',
    points: rows([
      [20, 11_340],
      [30, 13_392],
      [40, 13_793],
      [50, 9752],
      [60, 6373],
      [80, 4315],
    ]),
  },
  {
    label: 'LFP / graphite, 2 Ah 18650',
    source: 'BPX example set',
    points: rows([
      [20, 6619],
      [30, 21_075],
      [40, 107_000],
      [50, 84_700],
      [60, 25_000],
      [80, 55_300],
      [90, 169_000],
    ]),
  },
];
