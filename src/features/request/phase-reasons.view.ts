import type { SlotEstimateDto } from '#shared/contracts/estimate.schemas.ts';
import type {
  EstimateInput,
  Figure,
  FigureOrigin,
  LoadPhase,
  SlotEstimate,
} from '#shared/domain/hold-estimate/types.ts';
import { formatNumber } from '#src/lib/format-number.ts';
import { formatTemperature } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import { figureText } from './figure-text.view.ts';

/** As computed here, or as the server sent it. */
export type ShownEstimate = SlotEstimate | SlotEstimateDto;
export type KnownEstimate = Extract<ShownEstimate, { outcome: 'ok' | 'too-long' }>;

export type PhaseReason = { readonly why: string; readonly origin: FigureOrigin | null };

/** What a reason may draw on; the input is known only where the estimate was made here. */
type Known = { readonly estimate: KnownEstimate; readonly input: EstimateInput | undefined };

const words = t.request.reasons;

function find(estimate: KnownEstimate, key: string): Figure | undefined {
  return estimate.figures.find((figure) => figure.key === key);
}

/** A figure as text; empty where the estimate has none. */
function said(figure: Figure | undefined): string {
  return figure === undefined ? '' : figureText(figure.value, figure.unit);
}

function handling({ input }: Known, which: 'connect' | 'unload'): PhaseReason {
  if (input === undefined) {
    return { why: words.handling, origin: 'policy' };
  }
  const { process, cellCount } = input;
  const fixed = which === 'connect' ? process.connectFixedMin : process.unloadFixedMin;
  const perCell = which === 'connect' ? process.connectPerCellMin : process.unloadPerCellMin;
  return { why: words.perCell(fixed, perCell, cellCount), origin: 'policy' };
}

function ramp({ estimate, input }: Known): PhaseReason {
  const at = estimate.phases.find(({ phase }) => phase === 'ramp')?.setTemperatureC ?? 0;
  const to = formatTemperature(at, 0);
  if (input === undefined) {
    return { why: words.rampTo(to), origin: 'record' };
  }
  const { idleTemperatureC, rampKPerMin } = input.chamber;
  const rate = formatNumber(rampKPerMin, { decimals: 1 });
  return { why: words.ramp(formatTemperature(idleTemperatureC, 0), to, rate), origin: 'record' };
}

function soak({ estimate }: Known): PhaseReason {
  const heat = find(estimate, 'thermal-time-constant');
  return { why: words.soak(said(heat)), origin: heat?.origin ?? null };
}

function hold({ estimate }: Known): PhaseReason {
  const runs = find(estimate, 'safe-factor');
  const origin =
    runs?.origin === 'learned' ? 'learned' : (find(estimate, 'capacitance')?.origin ?? null);
  if (estimate.limitedBy === 'thermal') {
    return { why: words.holdThermal(said(find(estimate, 'thermal-time-constant'))), origin };
  }
  const { capacitanceF, seriesResistanceOhm } = estimate.numbers;
  return {
    why: words.hold(
      said(find(estimate, 'time-constant')),
      figureText(capacitanceF, 'F'),
      figureText(seriesResistanceOhm, 'ohm'),
    ),
    origin,
  };
}

function measure({ estimate }: Known): PhaseReason {
  const figure = find(estimate, 'measure');
  const allowance = figureText(estimate.numbers.allowanceA, 'A');
  const isByNoise = estimate.limitedBy === 'noise';
  return {
    why: isByNoise ? words.measureNoise(allowance) : words.measure(allowance),
    origin: figure?.origin ?? null,
  };
}

const reasons: Partial<Record<LoadPhase, (known: Known) => PhaseReason>> = {
  connect: (known) => handling(known, 'connect'),
  ramp,
  soak,
  match: () => ({ why: words.match, origin: 'policy' }),
  hold,
  measure,
  return: () => ({ why: words.back, origin: 'record' }),
  unload: (known) => handling(known, 'unload'),
};

/** Why a phase is as long as it is, in a line, and what kind of source says so. */
export function reasonOf(
  phase: LoadPhase,
  estimate: KnownEstimate,
  input: EstimateInput | undefined,
): PhaseReason {
  return reasons[phase]?.({ estimate, input }) ?? { why: '', origin: null };
}
