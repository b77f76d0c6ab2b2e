import { performance } from 'node:perf_hooks';
import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import { buildEstimateInput } from '#tests/support/build-estimate-input.ts';
import { report } from './report.ts';

// One estimate, as the form runs it at every key and the server at every candidate.
const input = buildEstimateInput();
for (let warmUp = 0; warmUp < 500; warmUp += 1) {
  estimateSlot(input);
}
const rounds = 2000;
const begin = performance.now();
for (let round = 0; round < rounds; round += 1) {
  estimateSlot(input);
}
report({
  name: 'estimate',
  value: (performance.now() - begin) / rounds,
  unit: 'ms',
  limit: { max: 1 },
});
