import type { ReactNode } from 'react';

const glass = <circle cx="7" cy="7" r="5.6" fill="none" stroke="currentColor" strokeWidth="1.5" />;

function staff(bead: number | null): ReactNode {
  return (
    <>
      <path d="M2 7h22" stroke="currentColor" strokeWidth="1.2" />
      <path d="M3 4.5v5M8 4.5v5M13 4.5v5M18 4.5v5M23 4.5v5" stroke="currentColor" />
      {bead === null ? (
        <path d="M8 12 18 2" stroke="currentColor" strokeWidth="1.6" />
      ) : (
        <circle cx={bead} cy="7" r="3.4" fill="currentColor" />
      )}
    </>
  );
}

function figure(options: { body: ReactNode; tail?: string; tailWidth?: string }): ReactNode {
  return (
    <>
      {options.body}
      <path
        d={options.tail ?? 'M20 11.3h5'}
        stroke="currentColor"
        strokeWidth={options.tailWidth ?? '1.4'}
      />
    </>
  );
}

const outline = <path d="M1 12 5 3H20V12z" fill="none" stroke="currentColor" strokeWidth="1.4" />;

/** One mark, one meaning. Shapes are `currentColor`, 14 x 14; requests and bookings 26 x 14. */
export const markShapes = {
  'in-date': (
    <>
      {glass}
      <circle cx="7" cy="7" r="3.6" fill="currentColor" />
    </>
  ),
  'due-soon': (
    <>
      {glass}
      <path d="M3.4 7a3.6 3.6 0 0 0 7.2 0z" fill="currentColor" />
    </>
  ),
  overdue: (
    <>
      {glass}
      <path d="M3 7h8" stroke="currentColor" strokeWidth="1.5" strokeDasharray="2 1.4" />
      <path d="M7 .2v3.6M7 10.2v3.6" stroke="currentColor" strokeWidth="2" />
    </>
  ),
  locked: (
    <>
      <path d="M1.5 1.5h11v11h-11z" fill="none" stroke="currentColor" strokeWidth="1.5" />
      <path d="M2 7.2 7.2 2M2 12 12 2M6.8 12 12 6.8" stroke="currentColor" strokeWidth="1.2" />
    </>
  ),
  limited: (
    <>
      <path
        d="M3.4 1.2H1.2v11.6h2.2M10.6 1.2h2.2v11.6h-2.2"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.5"
      />
      <circle cx="7" cy="7" r="2.6" fill="currentColor" />
    </>
  ),
  'out-of-service': (
    <>
      <circle
        cx="7"
        cy="7"
        r="5.6"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.5"
        strokeDasharray="2.4 2"
      />
      <path d="M4 7h6" stroke="currentColor" strokeWidth="1.8" />
    </>
  ),
  pass: <path d="M2 7.6 5.6 11 12 3.2" fill="none" stroke="currentColor" strokeWidth="2" />,
  caution: (
    <>
      <path
        d="M7 1.4 13 12.6H1z"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.5"
        strokeLinejoin="round"
      />
      <path d="M7 5.2v3.6M7 10v1.4" stroke="currentColor" strokeWidth="1.6" />
    </>
  ),
  stop: (
    <>
      <path d="M1.4 1.4h11.2v11.2H1.4z" fill="currentColor" />
      <path d="M4 7h6" stroke="var(--paper)" strokeWidth="2" />
    </>
  ),
  'to-do': <circle cx="7" cy="7" r="3.8" fill="none" stroke="currentColor" strokeWidth="1.5" />,
  'cannot-tell': (
    <>
      <path d="M1 7h2.2M5.4 7h3.2M10.8 7H13" stroke="currentColor" strokeWidth="2" />
      <path d="M3.2 2.5v9M10.8 2.5v9" stroke="currentColor" strokeWidth="1.3" />
    </>
  ),
  disturbed: (
    <path
      d="M1 7.5 3.4 7l1.8-4.6 3 9.2L10.2 6 13 7.2"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.6"
      strokeLinejoin="round"
    />
  ),
  draft: staff(3),
  asked: staff(8),
  offered: staff(13),
  booked: staff(18),
  answered: staff(23),
  withdrawn: staff(null),
  held: figure({
    body: (
      <path
        d="M1 12 5 3H20V12z"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.3"
        strokeDasharray="2.2 1.8"
      />
    ),
    tail: 'M20 11.4h1.6M23.4 11.4h1.6',
  }),
  confirmed: figure({ body: outline }),
  running: figure({
    body: (
      <>
        {outline}
        <path d="M1 12 5 3H12V12z" fill="currentColor" />
      </>
    ),
  }),
  done: figure({
    body: <path d="M1 12 5 3H20V12z" fill="currentColor" stroke="currentColor" strokeWidth="1.2" />,
    tailWidth: '1.8',
  }),
  'at-risk': figure({
    body: (
      <path
        d="M1 12 5 3H12l2 4 2-4H20V12z"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.5"
        strokeLinejoin="round"
      />
    ),
    tailWidth: '1.5',
  }),
  cancelled: (
    <>
      <path d="M1 12 5 3H20V12z" fill="none" stroke="currentColor" strokeWidth="1.2" />
      <path d="M2 2 24 12" stroke="currentColor" strokeWidth="1.5" />
    </>
  ),
} as const satisfies Record<string, ReactNode>;

export type MarkName = keyof typeof markShapes;

const wideMarks: readonly MarkName[] = [
  'draft',
  'asked',
  'offered',
  'booked',
  'answered',
  'withdrawn',
  'held',
  'confirmed',
  'running',
  'done',
  'at-risk',
  'cancelled',
];

export function markWidth(name: MarkName): 14 | 26 {
  return wideMarks.includes(name) ? 26 : 14;
}
