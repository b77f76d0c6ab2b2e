import type { RatioPosterior } from './types.ts';

/**
 * What is believed of observed hold / model hold before any run: median 1, nine in ten below 1.94.
 * It stands for what the model does not know.
 */
export const ratioPrior: RatioPosterior = {
  mean: 0,
  kappa: 2,
  shape: 2,
  rate: 0.25,
  runCount: 0,
};
