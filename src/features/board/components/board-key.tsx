import { Section } from '#src/components/layout/page.tsx';
import { PhaseFigure } from '#src/components/drawing/phase-figure.tsx';
import { t } from '#src/texts/t.ts';

const hour = 3600;
/** Lengths that let every part be seen; they are nobody's booking. */
const sample = [
  { phase: 'connect', seconds: 0.75 * hour },
  { phase: 'ramp', seconds: 1.2 * hour },
  { phase: 'soak', seconds: 1.9 * hour },
  { phase: 'match', seconds: 0.6 * hour },
  { phase: 'hold', seconds: 2.6 * hour },
  { phase: 'measure', seconds: 3 * hour },
  { phase: 'hold', seconds: 1.6 * hour, margin: true },
  { phase: 'wait', seconds: 1.8 * hour },
  { phase: 'return', seconds: 1.3 * hour },
  { phase: 'unload', seconds: 0.75 * hour },
] as const;

export function BoardKey() {
  return (
    <Section title={t.board.howToRead} note={<p>{t.board.howToReadNote}</p>}>
      <PhaseFigure phases={sample} label={t.board.howToRead} />
      <p className="mp-note mt-3">{t.board.safety}</p>
    </Section>
  );
}
