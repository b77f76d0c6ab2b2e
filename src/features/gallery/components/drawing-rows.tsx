import { PhaseBar, PhaseOutline } from '#src/components/drawing/phase-bar.tsx';
import { PhaseFigure } from '#src/components/drawing/phase-figure.tsx';
import { AllowanceGauge, RowGauge } from '#src/components/drawing/row-gauge.tsx';
import { SettlingChart } from '#src/components/drawing/settling-chart.tsx';
import { TideLine } from '#src/components/drawing/tide-line.tsx';
import { useElementWidth } from '#src/hooks/use-element-width.ts';
import { Section } from '#src/components/layout/page.tsx';
import { State } from '#src/components/ui/state.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { t } from '#src/texts/t.ts';
import {
  allowanceRows,
  exampleBand,
  exampleCurves,
  exampleLikelySeconds,
  examplePhases,
  exampleSafeSeconds,
  gaugeRows,
  keyPhases,
} from '../gallery.view.ts';

const barWidth = 300;
const bar = { phases: examplePhases, width: barWidth, number: t.gallery.reading.example };
const { rows } = t.gallery.reading;
const barRows = [
  {
    key: 'heron',
    meaning: rows.heron,
    drawing: <PhaseBar {...bar} words={t.gallery.reading.words} />,
  },
  { key: 'reed', meaning: rows.reed, drawing: <PhaseBar {...bar} tone="reed" isLifted /> },
  { key: 'finished', meaning: rows.finished, drawing: <PhaseBar {...bar} tone="finished" /> },
  {
    key: 'risk',
    meaning: rows.risk,
    drawing: <PhaseBar {...bar} tone="at-risk" riskFromSeconds={32_000} />,
  },
  {
    key: 'origin',
    meaning: rows.origin,
    drawing: <PhaseOutline phases={examplePhases} width={barWidth} />,
  },
];

export function BookingKey() {
  const { reading } = t.gallery;
  return (
    <Section title={reading.title} note={reading.note}>
      <PhaseFigure phases={keyPhases} label={reading.label} hasAxis={false} />
      <div className="mt-4 max-w-[640px]">
        <Table
          caption={reading.title}
          columns={[
            { key: 'drawing', head: reading.drawing, cell: (row) => row.drawing, width: 330 },
            { key: 'meaning', head: reading.meaning, cell: (row) => row.meaning },
          ]}
          rows={barRows}
          rowKey={(row) => row.key}
          middle
          stack
        />
      </div>
    </Section>
  );
}

const dayMs = 86_400_000;

export function ChamberKey() {
  const [ref, width] = useElementWidth<HTMLDivElement>(900);
  return (
    <Section title={t.gallery.chamber.title} note={t.gallery.chamber.note}>
      <div className="max-w-[900px]" ref={ref}>
        <TideLine
          window={{ startMs: 0, endMs: 7 * dayMs }}
          width={width}
          positions={8}
          steps={[
            { atMs: 0, taken: 4 },
            { atMs: 2.4 * dayMs, taken: 0 },
            { atMs: 2.6 * dayMs, taken: 7 },
            { atMs: 5 * dayMs, taken: 3 },
          ]}
          levels={[
            { startMs: 0, endMs: 2.7 * dayMs, temperatureC: 25 },
            { startMs: 2.9 * dayMs, endMs: 7 * dayMs, temperatureC: 45 },
          ]}
          label={t.gallery.chamber.label}
        />
      </div>
    </Section>
  );
}

export function SettlingKey() {
  const { settling } = t.gallery;
  return (
    <Section title={settling.title} note={settling.note}>
      <div className="max-w-[760px]">
        <SettlingChart
          curves={exampleCurves}
          band={exampleBand}
          target={{ lowA: 90e-6, highA: 110e-6, label: settling.target }}
          likelySeconds={exampleLikelySeconds}
          safeSeconds={exampleSafeSeconds}
          summary={settling.summary}
        />
      </div>
      <p className="mp-note mt-2">{settling.caution}</p>
    </Section>
  );
}

export function GaugeKey() {
  const { gauges } = t.gallery;
  const gaugeLines = [
    ...gaugeRows.map((row) => ({
      ...row,
      gauge: <RowGauge error={row.error} uncertainty={row.uncertainty} limit={1} guardBand={0.2} />,
    })),
    ...allowanceRows.map((row) => ({
      ...row,
      gauge: <AllowanceGauge value={row.value} uncertainty={row.uncertainty} allowance={1} />,
    })),
  ];
  return (
    <Section title={gauges.title} note={gauges.note}>
      <div className="max-w-[640px]">
        <Table
          caption={gauges.title}
          columns={[
            { key: 'gauge', head: gauges.head.gauge, cell: (row) => row.gauge, width: 200 },
            {
              key: 'word',
              head: gauges.head.reading,
              cell: (row) => (
                <State mark={row.mark} tone={row.tone} wrap>
                  {row.word}
                </State>
              ),
            },
          ]}
          rows={gaugeLines}
          rowKey={(row) => row.key}
          middle
          stack
        />
      </div>
    </Section>
  );
}
