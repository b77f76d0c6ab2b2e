type Span = { readonly fromMin: number; readonly toMin: number };

const clock = (minute: number) =>
  `${String(Math.floor(minute / 60)).padStart(2, '0')}:${String(minute % 60).padStart(2, '0')}`;

/** `08:00-12:00, 12:30-18:00`; empty where nobody works. */
export function writeSpans(spans: readonly Span[]): string {
  return spans.map((span) => `${clock(span.fromMin)}-${clock(span.toMin)}`).join(', ');
}

const pattern = /^(\d{1,2}):(\d{2})\s*[-–]\s*(\d{1,2}):(\d{2})$/;

function readSpan(text: string): Span | null {
  const match = pattern.exec(text.trim());
  if (match === null) {
    return null;
  }
  const [fromH = 0, fromM = 0, toH = 0, toM = 0] = match.slice(1).map(Number);
  const span = { fromMin: fromH * 60 + fromM, toMin: toH * 60 + toM };
  const isClock = fromM < 60 && toM < 60 && span.toMin <= 1440;
  return isClock && span.fromMin < span.toMin ? span : null;
}

/** Reads what was typed; null where it is no list of spans in order. */
export function readSpans(text: string): { fromMin: number; toMin: number }[] | null {
  if (text.trim() === '') {
    return [];
  }
  const spans: Span[] = [];
  for (const part of text.split(',')) {
    const span = readSpan(part);
    const last = spans.at(-1);
    if (span === null || (last !== undefined && last.toMin > span.fromMin)) {
      return null;
    }
    spans.push(span);
  }
  return spans.map((span) => ({ ...span }));
}
