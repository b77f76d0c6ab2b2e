import { useId, type CSSProperties, type ReactNode } from 'react';
import { t } from '#src/texts/t.ts';

/** One page: its title in the margin, what is the matter on the sheet, then the sections. */
export function Page(props: {
  title: string;
  subtitle?: ReactNode;
  /** The head of the sheet: the state in a sentence, or a line of explanation. */
  intro?: ReactNode;
  /** At the right end of the head; one filled button at most. */
  actions?: ReactNode;
  /** What an act has just done, under the head. */
  notice?: ReactNode;
  /** More under the head, before the first section: a fact list. */
  lead?: ReactNode;
  children?: ReactNode;
}) {
  return (
    <div className="mp-page">
      <title>{`${props.title} · ${t.layout.product}`}</title>
      <div className="mp-row">
        <div className="mp-margin">
          <h1>{props.title}</h1>
          {props.subtitle === undefined ? null : <p className="mp-subtitle">{props.subtitle}</p>}
        </div>
        <div className="mp-sheet mp-stack">
          <div className="mp-page-head">
            <div className="mp-intro">{props.intro}</div>
            {props.actions === undefined ? null : <div className="mp-acts">{props.actions}</div>}
          </div>
          {props.notice}
          {props.lead}
        </div>
      </div>
      {props.children}
    </div>
  );
}

/** A row `margin | sheet` with a hairline above it. The note is at most five short lines. */
export function Section(props: {
  title: string;
  note?: ReactNode;
  children: ReactNode;
  id?: string | undefined;
}) {
  const headId = useId();
  return (
    <section className="mp-row" aria-labelledby={headId} id={props.id}>
      <div className="mp-margin">
        <h2 id={headId}>{props.title}</h2>
        {props.note === undefined ? null : (
          <div className="mp-note mp-margin-note">{props.note}</div>
        )}
      </div>
      <div className="mp-sheet">{props.children}</div>
    </section>
  );
}

type FirstColumn = CSSProperties & { '--mp-first': string };

/** Two columns inside a sheet, never three; `form` is the ledger beside its live result. */
export function TwoColumns(props: {
  children: readonly [ReactNode, ReactNode];
  kind?: 'figure' | 'form' | undefined;
  firstWidth?: number | undefined;
}) {
  const style: FirstColumn = { '--mp-first': `${props.firstWidth ?? 700}px` };
  return (
    <div className={props.kind === 'form' ? 'mp-form-two' : 'mp-two'} style={style}>
      <div className="min-w-0">{props.children[0]}</div>
      <div className="min-w-0">{props.children[1]}</div>
    </div>
  );
}
