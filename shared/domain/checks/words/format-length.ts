/**
 * A length of time in hours and minutes, rounded to the minute.
 *
 * @param lengthS s
 * @example formatLength(57600) // '16 h 00 min'
 */
export function formatLength(lengthS: number): string {
  const minutes = Math.round(lengthS / 60);
  if (minutes < 60) {
    return `${minutes} min`;
  }
  return `${Math.floor(minutes / 60)} h ${String(minutes % 60).padStart(2, '0')} min`;
}
