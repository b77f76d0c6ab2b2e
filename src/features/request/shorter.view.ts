import { estimateSlot } from '#shared/domain/hold-estimate/estimate-slot.ts';
import type { EstimateInput } from '#shared/domain/hold-estimate/types.ts';
import { formatNumber } from '#src/lib/format-number.ts';
import { formatCurrentA, formatPercent, formatResistanceOhm } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';

export type ShorterWay = {
  readonly key: string;
  readonly text: string;
  readonly safeTotalS: number;
};

type Change = { readonly key: string; readonly text: string; readonly input: EstimateInput };

const words = t.request.shorter;
/** Less than one step of the grid of starts is no gain. */
const worthwhileS = 900;
const widestFraction = 0.5;
const usualRatio = 3;

function widerTolerance(input: EstimateInput): readonly Change[] {
  const { tolerance } = input;
  if (tolerance.kind === 'absolute') {
    const currentA = tolerance.currentA * 2;
    const text = words.tolerance(formatCurrentA(currentA), formatCurrentA(tolerance.currentA));
    return [
      { key: 'tolerance', text, input: { ...input, tolerance: { kind: 'absolute', currentA } } },
    ];
  }
  const fraction = Math.min(widestFraction, tolerance.fraction * 2);
  const text = words.tolerance(percentText(fraction), percentText(tolerance.fraction));
  return [
    { key: 'tolerance', text, input: { ...input, tolerance: { kind: 'relative', fraction } } },
  ];
}

function percentText(fraction: number): string {
  const decimals = Number.isInteger(Math.round(fraction * 1e6) / 1e4) ? 0 : 1;
  return formatPercent(fraction, decimals);
}

function otherAim(input: EstimateInput): readonly Change[] {
  if (input.kind === 'screening') {
    const { badToGoodRatio } = input.screening;
    const wider = badToGoodRatio * 2;
    const plain = (ratio: number) =>
      formatNumber(ratio, { decimals: Number.isInteger(ratio) ? 0 : 1 });
    return [
      {
        key: 'ratio',
        text: words.ratio(plain(wider), plain(badToGoodRatio)),
        input: { ...input, screening: { ...input.screening, badToGoodRatio: wider } },
      },
    ];
  }
  const screening = { ...input.screening, badToGoodRatio: usualRatio };
  return [
    ...widerTolerance(input),
    {
      key: 'screening',
      text: words.screening(usualRatio),
      input: { ...input, kind: 'screening', screening },
    },
  ];
}

function thickerLeads(input: EstimateInput): readonly Change[] {
  const present = input.wiring.leadResistanceOhm;
  const leadResistanceOhm = present / 2;
  return present <= 0
    ? []
    : [
        {
          key: 'leads',
          text: words.leads(formatResistanceOhm(leadResistanceOhm), formatResistanceOhm(present)),
          input: { ...input, wiring: { ...input.wiring, leadResistanceOhm } },
        },
      ];
}

/** Changes that would give a slot worth saying shorter, the shortest first. */
export function shorterWays(input: EstimateInput, safeTotalS: number): readonly ShorterWay[] {
  return [...otherAim(input), ...thickerLeads(input)]
    .flatMap(({ key, text, input: changed }) => {
      const estimate = estimateSlot(changed);
      return estimate.outcome === 'ok' ? [{ key, text, safeTotalS: estimate.safeTotalS }] : [];
    })
    .filter((way) => way.safeTotalS <= safeTotalS - worthwhileS)
    .toSorted((a, b) => a.safeTotalS - b.safeTotalS);
}
