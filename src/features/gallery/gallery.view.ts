import type { BarPhase } from '#src/components/drawing/phase-bar.tsx';
import type { SettlingCurve } from '#src/components/drawing/settling-chart.tsx';
import type { MarkName, Tone } from '#src/components/ui/mark.tsx';
import { t } from '#src/texts/t.ts';

export type MarkEntry = { readonly mark: MarkName; readonly tone: Tone; readonly word: string };
export type MarkGroup = {
  readonly title: string;
  readonly note: string;
  readonly marks: readonly MarkEntry[];
};

const { calibration, checks, log, work, request, booking } = t.gallery;

export const markGroups: readonly MarkGroup[] = [
  {
    ...calibration,
    marks: [
      { mark: 'in-date', tone: 'reed', word: calibration.words.inDate },
      { mark: 'due-soon', tone: 'marigold', word: calibration.words.dueSoon },
      { mark: 'overdue', tone: 'brick', word: calibration.words.overdue },
      { mark: 'locked', tone: 'brick', word: calibration.words.locked },
      { mark: 'limited', tone: 'marigold', word: calibration.words.limited },
      { mark: 'out-of-service', tone: 'ink', word: calibration.words.outOfService },
    ],
  },
  {
    ...checks,
    marks: [
      { mark: 'pass', tone: 'reed', word: checks.words.pass },
      { mark: 'caution', tone: 'marigold', word: checks.words.caution },
      { mark: 'stop', tone: 'brick', word: checks.words.stop },
    ],
  },
  {
    ...log,
    marks: [
      { mark: 'pass', tone: 'reed', word: log.words.ok },
      { mark: 'disturbed', tone: 'brick', word: log.words.disturbed },
      { mark: 'cannot-tell', tone: 'ink', word: log.words.cannotTell },
    ],
  },
  { ...work, marks: [{ mark: 'to-do', tone: 'ink', word: work.words.todo }] },
  {
    ...request,
    marks: [
      { mark: 'draft', tone: 'ink', word: request.words.draft },
      { mark: 'asked', tone: 'heron', word: request.words.asked },
      { mark: 'offered', tone: 'heron', word: request.words.offered },
      { mark: 'booked', tone: 'reed', word: request.words.booked },
      { mark: 'answered', tone: 'reed', word: request.words.answered },
      { mark: 'withdrawn', tone: 'ink', word: request.words.withdrawn },
    ],
  },
  {
    ...booking,
    marks: [
      { mark: 'held', tone: 'heron', word: booking.words.held },
      { mark: 'confirmed', tone: 'heron', word: booking.words.confirmed },
      { mark: 'running', tone: 'reed', word: booking.words.running },
      { mark: 'done', tone: 'ink', word: booking.words.done },
      { mark: 'at-risk', tone: 'marigold', word: booking.words.atRisk },
      { mark: 'cancelled', tone: 'ink', word: booking.words.cancelled },
    ],
  },
];

/** The key shows every part once, wide enough for its name; its lengths mean nothing. */
export const keyPhases: readonly BarPhase[] = [
  { phase: 'connect', seconds: 50 },
  { phase: 'ramp', seconds: 74 },
  { phase: 'soak', seconds: 110 },
  { phase: 'match', seconds: 40 },
  { phase: 'hold', seconds: 156 },
  { phase: 'measure', seconds: 184 },
  { phase: 'hold', seconds: 100, margin: true },
  { phase: 'wait', seconds: 110 },
  { phase: 'return', seconds: 82 },
  { phase: 'unload', seconds: 50 },
];

/** A plausible slot for the example bars: 15 h 15 min in all. */
export const examplePhases: readonly BarPhase[] = [
  { phase: 'connect', seconds: 1140 },
  { phase: 'ramp', seconds: 1200 },
  { phase: 'soak', seconds: 7320 },
  { phase: 'match', seconds: 1200 },
  { phase: 'hold', seconds: 9960 },
  { phase: 'measure', seconds: 21_600 },
  { phase: 'hold', seconds: 3900, margin: true },
  { phase: 'wait', seconds: 3540 },
  { phase: 'return', seconds: 3900 },
  { phase: 'unload', seconds: 1140 },
];

/** I(t) = I∞ + (I0 − I∞)·exp(−t/τ), the shape of every settling here: it never overshoots. */
function exponential(startA: number, endA: number, tauS: number, lengthS: number) {
  return Array.from({ length: 61 }, (_, index) => {
    const seconds = (index / 60) * lengthS;
    return { seconds, currentA: endA + (startA - endA) * Math.exp(-seconds / tauS) };
  });
}

const lengthS = 6 * 3600;
export const exampleCurves: readonly SettlingCurve[] = [
  {
    key: 'low',
    kind: 'measured',
    points: exponential(-50e-6, 100e-6, 3600, lengthS),
    label: t.gallery.settling.curve,
  },
  {
    key: 'high',
    kind: 'predicted',
    points: exponential(150e-6, 100e-6, 3600, lengthS),
    label: t.gallery.settling.high,
  },
];
export const exampleBand = exponential(-50e-6, 100e-6, 3600, lengthS).map((point) => ({
  seconds: point.seconds,
  lowA: 100e-6 - 150e-6 * Math.exp(-point.seconds / 4500),
  highA: 100e-6 - 150e-6 * Math.exp(-point.seconds / 2800),
}));
/** −τ·ln(D/ΔI) with D = 10 µA of ΔI = 150 µA and τ = 3600 s. */
export const exampleLikelySeconds = 3600 * Math.log(15);
export const exampleSafeSeconds = 12_600;

export const gaugeRows = [
  {
    key: 'pass',
    error: 0.6,
    uncertainty: 0.2,
    mark: 'pass',
    tone: 'reed',
    word: t.gallery.gauges.pass,
  },
  {
    key: 'pass-guard',
    error: 0.95,
    uncertainty: 0.2,
    mark: 'caution',
    tone: 'marigold',
    word: t.gallery.gauges.passGuard,
  },
  {
    key: 'fail-guard',
    error: 1.12,
    uncertainty: 0.2,
    mark: 'stop',
    tone: 'brick',
    word: t.gallery.gauges.failGuard,
  },
  {
    key: 'fail',
    error: -2.1,
    uncertainty: 0.2,
    mark: 'stop',
    tone: 'brick',
    word: t.gallery.gauges.fail,
  },
] as const;

export const allowanceRows = [
  {
    key: 'ok',
    value: 0.6,
    uncertainty: 0.25,
    mark: 'pass',
    tone: 'reed',
    word: t.gallery.gauges.ok,
  },
  {
    key: 'disturbed',
    value: 1.4,
    uncertainty: 0.2,
    mark: 'disturbed',
    tone: 'brick',
    word: t.gallery.gauges.disturbed,
  },
  {
    key: 'cannot-tell',
    value: 0.95,
    uncertainty: 0.4,
    mark: 'cannot-tell',
    tone: 'ink',
    word: t.gallery.gauges.cannotTell,
  },
] as const;

export const colourNames = [
  'paper',
  'sheet',
  'mist',
  'ink',
  'ink-2',
  'ink-3',
  'rule',
  'rule-2',
  'edge',
  'reed',
  'reed-wash',
  'heron',
  'heron-deep',
  'heron-mid',
  'heron-wash',
  'marigold',
  'marigold-ink',
  'marigold-wash',
  'brick',
  'brick-wash',
  'shut',
] as const;
