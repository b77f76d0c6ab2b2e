import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { Today } from '#shared/contracts/board.contract.ts';
import { Section } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import type { MarkName, Tone } from '#src/components/ui/mark.tsx';
import { State } from '#src/components/ui/state.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { formatAge } from '#src/lib/format-duration.ts';
import { t } from '#src/texts/t.ts';

const words = t.today;
type Wait = Today['waits'][number];

const looks: Record<Wait['kind'], { mark: MarkName; tone: Tone }> = {
  proposal: { mark: 'to-do', tone: 'heron' },
  request: { mark: 'to-do', tone: 'ink' },
  'at-risk': { mark: 'caution', tone: 'marigold' },
  'second-signature': { mark: 'to-do', tone: 'ink' },
  release: { mark: 'locked', tone: 'brick' },
  draft: { mark: 'to-do', tone: 'ink' },
  booking: { mark: 'to-do', tone: 'heron' },
  deviation: { mark: 'caution', tone: 'marigold' },
};
const shownAtFirst = 12;

/** What this person is waited for, oldest first. */
export function WaitsSection(props: { waits: Today['waits'] }) {
  const site = useSite();
  const nowMs = useNow();
  const [isWhole, setIsWhole] = useState(false);
  const rows = isWhole ? props.waits : props.waits.slice(0, shownAtFirst);
  const hidden = props.waits.length - rows.length;
  const heads = words.waitColumns;
  return (
    <Section title={words.waits} note={<p>{words.waitsNote}</p>}>
      <Table
        caption={words.waits}
        rows={rows}
        rowKey={(row) => `${row.kind}-${row.href}-${row.what}`}
        empty={words.noWaits}
        stack
        columns={[
          {
            key: 'kind',
            head: heads.kind,
            nowrap: true,
            cell: (row) => (
              <State mark={looks[row.kind].mark} tone={looks[row.kind].tone}>
                {words.kinds[row.kind]}
              </State>
            ),
          },
          { key: 'what', head: heads.what, cell: (row) => <b>{row.what}</b> },
          { key: 'why', head: heads.why, cell: (row) => row.why },
          {
            key: 'since',
            head: heads.since,
            mono: true,
            align: 'right',
            cell: (row) => formatAge((nowMs - Date.parse(row.since)) / 1000),
          },
          {
            key: 'act',
            head: '',
            label: words.actions,
            align: 'right',
            nowrap: true,
            cell: (row) => (
              <Link to={`/${site.code}${row.href}`} aria-label={`${row.action}: ${row.what}`}>
                {row.action}
              </Link>
            ),
          },
        ]}
      />
      {hidden === 0 ? null : (
        <div className="mp-acts mt-2">
          <Button
            kind="link"
            onClick={() => {
              setIsWhole(true);
            }}
          >
            {words.moreWaits(hidden)}
          </Button>
        </div>
      )}
    </Section>
  );
}
