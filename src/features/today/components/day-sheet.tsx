import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Today } from '#shared/contracts/board.contract.ts';
import { DayTide } from '#src/components/drawing/day-tide.tsx';
import { Button } from '#src/components/ui/button.tsx';
import type { MarkName } from '#src/components/ui/mark.tsx';
import { State } from '#src/components/ui/state.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { formatClock } from '#src/lib/format-date.ts';
import { t } from '#src/texts/t.ts';
import { countFolded, dayWindow } from '../day-window.view.ts';

const words = t.today;
type Happening = Today['happenings'][number];

/** The figure of a booking fills as far as it has got. */
const marks: Record<Happening['kind'], MarkName> = {
  load: 'confirmed',
  settled: 'running',
  unload: 'done',
  outage: 'out-of-service',
  due: 'due-soon',
};

/** The day drawn as a tide of taken positions with its doors, and what happens in it. */
export function DaySheet(props: { today: Today }) {
  const { today } = props;
  const site = useSite();
  const nowMs = useNow();
  const [isWhole, setIsWhole] = useState(false);
  const window = dayWindow(today, site.zone);
  const now = today.tide.filter((step) => Date.parse(step.at) <= nowMs).at(-1)?.count ?? 0;
  const heads = words.happeningColumns;
  const hidden = isWhole ? 0 : countFolded(today.happenings, nowMs);
  return (
    <>
      <DayTide
        window={window}
        zone={site.zone}
        nowMs={nowMs}
        steps={today.tide.map((step) => ({ atMs: Date.parse(step.at), taken: step.count }))}
        positions={today.positions}
        doors={today.doors.map((door) => ({
          atMs: Date.parse(door.at),
          label: words.door(door.chamberTag, words.doors[door.what]),
        }))}
        staffed={today.staffed.map((span) => ({
          startMs: Date.parse(span.startAt),
          endMs: Date.parse(span.endAt),
        }))}
        label={words.tide(now, today.positions)}
      />
      {hidden === 0 ? null : (
        <Button
          kind="link"
          onClick={() => {
            setIsWhole(true);
          }}
        >
          {words.earlierToday(hidden)}
        </Button>
      )}
      <Table
        caption={words.day}
        rows={today.happenings.slice(hidden)}
        rowKey={(row) => `${row.at}-${row.what}`}
        rowState={(row) => (Date.parse(row.at) < nowMs ? 'past' : undefined)}
        empty={words.nothing}
        stack
        columns={[
          {
            key: 'time',
            head: heads.time,
            mono: true,
            cell: (row) => (row.kind === 'due' ? '24:00' : formatClock(row.at, site.zone)),
          },
          { key: 'what', head: heads.what, cell: (row) => row.what },
          { key: 'touches', head: heads.touches, cell: (row) => row.touches },
          {
            key: 'state',
            head: heads.state,
            cell: (row) => (
              <State mark={marks[row.kind]} tone={row.tone}>
                {row.state}
              </State>
            ),
          },
          {
            key: 'act',
            head: '',
            label: words.actions,
            align: 'right',
            cell: (row) =>
              row.href === null ? null : (
                <Link to={`/${site.code}${row.href}`} aria-label={`${words.open}: ${row.what}`}>
                  {words.open}
                </Link>
              ),
          },
        ]}
      />
    </>
  );
}
