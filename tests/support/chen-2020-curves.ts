/**
 * Published curve fits of the 5 Ah 21700 NMC811/graphite-SiOx cell: open-circuit potentials of Chen
 * 2020 (J. Electrochem. Soc. 167 080534) and entropic coefficients of O'Regan 2022 (Electrochim. Acta
 * 425 140700), on the stoichiometry windows of Chen 2020. They check our figures from outside.
 */
const windows = { negative: [0.0279, 0.9014], positive: [0.9077, 0.2661] } as const;

function stoichiometry(soc: number, electrode: keyof typeof windows): number {
  const [empty, full] = windows[electrode];
  return empty + soc * (full - empty);
}

function graphitePotentialV(x: number): number {
  return (
    1.9793 * Math.exp(-39.3631 * x) +
    0.2482 -
    0.0909 * Math.tanh(29.8538 * (x - 0.1234)) -
    0.04478 * Math.tanh(14.9159 * (x - 0.2769)) -
    0.0205 * Math.tanh(30.4444 * (x - 0.6103))
  );
}

function nmcPotentialV(y: number): number {
  return (
    -0.809 * y +
    4.4875 -
    0.0428 * Math.tanh(18.5138 * (y - 0.5542)) -
    17.7326 * Math.tanh(15.789 * (y - 0.3117)) +
    17.5842 * Math.tanh(15.9308 * (y - 0.312))
  );
}

/** Open-circuit voltage of the full cell at a state of charge 0-1, V. */
export function openCircuitVoltageV(soc: number): number {
  return (
    nmcPotentialV(stoichiometry(soc, 'positive')) -
    graphitePotentialV(stoichiometry(soc, 'negative'))
  );
}

/** dU/dT of the full cell at a state of charge 0-1, mV/K. */
export function entropicCoefficientMvPerK(soc: number): number {
  const x = stoichiometry(soc, 'negative');
  const y = stoichiometry(soc, 'positive');
  const graphite = -0.1112 * x + 0.02914 + 0.3561 * Math.exp(-((x - 0.08309) ** 2) / 0.004616);
  const nmc =
    0.04006 * Math.exp(-((y - 0.2828) ** 2) / 0.0009855) -
    0.06656 * Math.exp(-((y - 0.8032) ** 2) / 0.02179);
  return nmc - graphite;
}
