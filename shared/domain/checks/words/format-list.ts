/**
 * A list for a sentence; of a long one the first three and how many more.
 *
 * @example formatList(['A', 'B']) // 'A and B'
 */
export function formatList(items: readonly string[]): string {
  const [first, second, third] = items;
  if (first === undefined || second === undefined) {
    return first ?? '';
  }
  if (items.length > 4 && third !== undefined) {
    return `${first}, ${second}, ${third} and ${items.length - 3} more`;
  }
  return `${items.slice(0, -1).join(', ')} and ${items.at(-1) ?? ''}`;
}
