import { thinSpace } from './format-number.ts';

const minuteS = 60;
const hourS = 3600;
const dayS = 86_400;

function part(value: number, unit: string, width = 1): string {
  return `${String(value).padStart(width, '0')}${thinSpace}${unit}`;
}

/** `15 h 45 min`, `45 min`, `7 min 30 s`, `40 s`: minutes from an hour on, seconds below. */
export function formatDuration(seconds: number): string {
  const whole = Math.round(Math.abs(seconds));
  if (whole < minuteS) {
    return part(whole, 's');
  }
  if (whole < hourS) {
    const rest = whole % minuteS;
    const minutes = part(Math.floor(whole / minuteS), 'min');
    return rest === 0 ? minutes : `${minutes} ${part(rest, 's')}`;
  }
  return formatHours(whole);
}

/** The form of a column: always hours and minutes, `0 h 45 min`, `6 h 00 min`. */
export function formatHours(seconds: number): string {
  const minutes = Math.round(Math.abs(seconds) / minuteS);
  return `${part(Math.floor(minutes / 60), 'h')} ${part(minutes % 60, 'min', 2)}`;
}

/** How long ago something was: `97 d`, `19 h`, `2 h 10 min`, `12 min`. */
export function formatAge(seconds: number): string {
  const whole = Math.max(0, Math.round(seconds));
  if (whole >= 2 * dayS) {
    return part(Math.floor(whole / dayS), 'd');
  }
  if (whole >= 12 * hourS) {
    return part(Math.floor(whole / hourS), 'h');
  }
  return whole < hourS ? part(Math.floor(whole / minuteS), 'min') : formatHours(whole);
}

/** What is left until a moment: `1 d 13 h`, `5 d`, `2 h 10 min`. */
export function formatRemaining(seconds: number): string {
  const whole = Math.max(0, Math.round(seconds));
  if (whole < dayS) {
    return formatDuration(whole);
  }
  const days = part(Math.floor(whole / dayS), 'd');
  const hours = Math.floor((whole % dayS) / hourS);
  return whole >= 7 * dayS || hours === 0 ? days : `${days} ${part(hours, 'h')}`;
}
