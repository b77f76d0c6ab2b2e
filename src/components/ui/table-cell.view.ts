type CellLook = {
  readonly align?: 'left' | 'right' | undefined;
  readonly mono?: boolean | undefined;
  readonly nowrap?: boolean | undefined;
};

/** Figures stand right in mono unless the column says left (tags, times). */
export function cellClass(look: CellLook, part: 'head' | 'body'): string | undefined {
  const names = [
    (look.align ?? 'left') === 'right' ? 'mp-right' : '',
    part === 'body' && look.mono ? 'mp-figures' : '',
    look.nowrap ? 'mp-nowrap' : '',
  ].filter((name) => name !== '');
  return names.length === 0 ? undefined : names.join(' ');
}
