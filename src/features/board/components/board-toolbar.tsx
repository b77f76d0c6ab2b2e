import { boardGroups, type BoardGroup } from '#shared/contracts/board.contract.ts';
import { Button, LinkButton } from '#src/components/ui/button.tsx';
import { Choice } from '#src/components/ui/choice.tsx';
import { TextInput } from '#src/components/ui/input.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useMay, useSite } from '#src/hooks/use-site.ts';
import { paths } from '#src/app/paths.ts';
import { t } from '#src/texts/t.ts';
import { boardViews, shiftDay, spanTitle, type BoardSpan } from '../board-window.view.ts';
import type { BoardState } from '../use-board-state.ts';

/** Which stretch, which rows: all of it lives in the address. */
export function BoardToolbar(props: { span: BoardSpan; state: BoardState; today: string }) {
  const { span, state } = props;
  const site = useSite();
  const may = useMay();
  const words = t.board;
  const setGroup = (group: BoardGroup, isShown: boolean) => {
    const next = boardGroups.filter((each) =>
      each === group ? isShown : state.groups.includes(each),
    );
    state.setGroups(next.length === 0 ? boardGroups : next);
  };
  return (
    <div className="mp-board-tools">
      <div className="mp-acts mp-board-steps">
        <Button
          aria-label={words.earlier}
          onClick={() => {
            state.setDay(shiftDay(span, -1, site.zone));
          }}
        >
          ←
        </Button>
        <b className="mp-board-span">{spanTitle(span, words.to)}</b>
        <Button
          aria-label={words.later}
          onClick={() => {
            state.setDay(shiftDay(span, 1, site.zone));
          }}
        >
          →
        </Button>
        <Button
          kind="link"
          onClick={() => {
            state.setDay(props.today);
          }}
        >
          {words.today}
        </Button>
      </div>
      <Choice
        label={words.view}
        value={span.view}
        onChange={state.setView}
        options={boardViews.map((view) => ({ value: view, label: words.views[view] }))}
      />
      <div className="mp-acts mp-board-end">
        <LinkButton kind="link" to={paths.equipment.href(site.code)}>
          {words.reportBreakdown}
        </LinkButton>
        {may('booking.confirm') ? (
          <LinkButton to={`${paths.requests.href(site.code)}?state=submitted,partly-booked`}>
            {words.bookByForm}
          </LinkButton>
        ) : null}
      </div>
      <div className="mp-board-filters">
        <div className="mp-acts">
          {boardGroups.map((group) => (
            <Tick
              key={group}
              checked={state.groups.includes(group)}
              onChange={(event) => {
                setGroup(group, event.target.checked);
              }}
            >
              {words.groups[group]}
            </Tick>
          ))}
        </div>
        <label className="mp-board-find">
          <span className="mp-note">{words.filterText}</span>
          <TextInput
            type="search"
            value={state.text}
            onChange={(event) => {
              state.setText(event.target.value);
            }}
          />
        </label>
      </div>
    </div>
  );
}
