import { formatDuration, formatHours } from '#src/lib/format-duration.ts';
import { formatInstant, formatRelativeDays } from '#src/lib/format-date.ts';
import { splitQuantity, type QuantityFormat } from '#src/lib/format-quantity.ts';
import { thinSpace } from '#src/lib/format-number.ts';

/** A measured value: mono, tabular, the unit quieter than the figure. */
export function Quantity(props: {
  /** In the base unit: amperes, volts, ohms. */
  value: number;
  unit: string;
  format?: QuantityFormat | undefined;
  /** Written before the figure, as `±`. */
  before?: string | undefined;
}) {
  const { figure, unit } = splitQuantity(props.value, props.unit, props.format);
  return <Figure figure={figure} unit={unit} before={props.before} />;
}

/** A figure already put into words by a view, with its unit. */
export function Figure(props: { figure: string; unit?: string; before?: string | undefined }) {
  return (
    <span className="mp-figure">
      {props.before === undefined ? null : `${props.before}${thinSpace}`}
      {props.figure}
      {props.unit === undefined ? null : <span className="mp-unit">{props.unit}</span>}
    </span>
  );
}

/** A length of time; `column` keeps hours and minutes even under an hour. */
export function Duration(props: { seconds: number; column?: boolean | undefined }) {
  const write = props.column ? formatHours : formatDuration;
  return <span className="mp-figure">{write(props.seconds)}</span>;
}

/** An instant told in the zone of its site, machine-readable beside. */
export function SiteTime(props: { at: string; zone: string; currentYear?: number | undefined }) {
  return (
    <time className="mp-figure" dateTime={props.at}>
      {formatInstant(props.at, { zone: props.zone, currentYear: props.currentYear })}
    </time>
  );
}

/** A calendar day said against today: `in 5 d`. */
export function RelativeDays(props: { day: string; today: string }) {
  return (
    <time className="whitespace-nowrap" dateTime={props.day}>
      {formatRelativeDays(props.day, props.today)}
    </time>
  );
}
