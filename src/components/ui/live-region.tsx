import { useDebouncedText } from '#src/hooks/use-debounced-text.ts';

/** Tells a screen reader the newest result once nothing has changed for 400 ms. */
export function LiveRegion(props: { message: string; delayMs?: number | undefined }) {
  const settled = useDebouncedText(props.message, props.delayMs);
  return (
    <p className="mp-hidden" role="status" aria-live="polite">
      {settled}
    </p>
  );
}
