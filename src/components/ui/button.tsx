import type { ComponentProps, MouseEvent } from 'react';
import { Link } from 'react-router-dom';

type Kind = 'primary' | 'secondary' | 'danger' | 'link';
type Size = 'small' | 'normal' | 'large';

function classNames(kind: Kind, size: Size, extra?: string): string {
  const base = kind === 'link' ? ['mp-link-button'] : ['mp-button', `mp-button-${kind}`];
  const sized = kind === 'link' || size === 'normal' ? [] : [`mp-button-${size}`];
  return [...base, ...sized, extra ?? ''].join(' ').trim();
}

export type ButtonProps = Omit<ComponentProps<'button'>, 'disabled'> & {
  kind?: Kind | undefined;
  size?: Size | undefined;
  /**
   * Why it cannot be pressed now. The button keeps its place in the tab order, gets a dashed edge
   * and says the reason after its words: `Send for approval: 1 point missing`.
   */
  why?: string | undefined;
  /** The act is under way: a second press is ignored, the words stay. */
  busy?: boolean | undefined;
};

export function Button({
  kind = 'secondary',
  size = 'normal',
  why,
  busy,
  onClick,
  className,
  children,
  type = 'button',
  ...rest
}: ButtonProps) {
  const isStopped = why !== undefined || busy === true;
  const press = (event: MouseEvent<HTMLButtonElement>) => {
    if (isStopped) {
      event.preventDefault();
      return;
    }
    onClick?.(event);
  };
  return (
    <button
      {...rest}
      type={type}
      className={classNames(kind, size, className)}
      onClick={press}
      aria-disabled={why === undefined ? undefined : true}
      aria-busy={busy ? true : undefined}
    >
      {why === undefined ? (
        children
      ) : (
        <span>
          {children}
          {`: ${why}`}
        </span>
      )}
    </button>
  );
}

/** A link with the looks of a button: it goes somewhere, it does not act. */
export function LinkButton(props: {
  to: string;
  kind?: Kind | undefined;
  size?: Size | undefined;
  /** A plain request to the server (sign-in, a file) instead of a page of the client. */
  external?: boolean | undefined;
  className?: string | undefined;
  children: ComponentProps<'a'>['children'];
}) {
  const className = classNames(props.kind ?? 'secondary', props.size ?? 'normal', props.className);
  return props.external ? (
    <a className={className} href={props.to}>
      {props.children}
    </a>
  ) : (
    <Link className={className} to={props.to}>
      {props.children}
    </Link>
  );
}
