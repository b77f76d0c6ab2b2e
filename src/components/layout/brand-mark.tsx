/** A trace settling to its level in a vessel. */
export function BrandMark(props: { size: number }) {
  return (
    <svg width={props.size} height={props.size} viewBox="0 0 22 22" aria-hidden="true">
      <path d="M2.9 3.6C4.6 10.4 7 12.6 19.1 12.6V19.1H2.9z" fill="var(--heron-wash)" />
      <path
        d="M2.9 3.6C4.6 10.4 7 12.6 19.1 12.6"
        fill="none"
        stroke="var(--heron)"
        strokeWidth="1.8"
      />
      <path d="M2 2v18h18V2" fill="none" stroke="var(--ink)" strokeWidth="1.8" />
    </svg>
  );
}
