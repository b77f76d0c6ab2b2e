import { LinkButton } from '#src/components/ui/button.tsx';
import { BrandMark } from '#src/components/layout/brand-mark.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { t } from '#src/texts/t.ts';
import { SettlingPond } from './settling-pond.tsx';

export type DemoPerson = {
  readonly role: string;
  readonly name: string;
  readonly does: string;
  readonly href: string;
};

export type SignInPageProps = {
  organisation: string;
  /** Where the organisation's sign-in begins; a plain request to the server. */
  signInHref: string;
  helpHref: string;
  people: readonly DemoPerson[];
  /** The local stand-in for the organisation's sign-in is running: demo people may be taken. */
  isStandIn: boolean;
  /** Why the last attempt ended, as one sentence. */
  problem?: string | undefined;
};

function LookRound(props: { people: readonly DemoPerson[] }) {
  const { columns } = t.session;
  return (
    <div>
      <h2 id="look-round">{t.session.lookRound}</h2>
      <table className="mp-table" aria-labelledby="look-round">
        <thead className="mp-hidden">
          <tr>
            <th scope="col">{columns.role}</th>
            <th scope="col">{columns.name}</th>
            <th scope="col">{columns.does}</th>
          </tr>
        </thead>
        <tbody>
          {props.people.map((person) => (
            <tr key={person.href}>
              <td>
                <a href={person.href}>{person.role}</a>
              </td>
              <td className="mp-nowrap">{person.name}</td>
              <td className="mp-quiet">{person.does}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="mp-help">{t.session.demo}</p>
    </div>
  );
}

export function SignInPage(props: SignInPageProps) {
  return (
    <div className="mp-sign-in">
      <title>{t.layout.product}</title>
      <main id="main" tabIndex={-1} className="mp-sign-in-top mp-row">
        <div className="mp-margin">
          <span className="mp-sign-in-brand">
            <BrandMark size={30} />
            {t.layout.product}
          </span>
        </div>
        <div className="mp-sheet">
          <div>
            <h1>{t.session.title(props.organisation)}</h1>
            <p className="mp-sign-in-lead">{t.session.lead}</p>
            {props.problem === undefined ? null : (
              <Notice kind="stop" role="alert">
                {props.problem}
              </Notice>
            )}
            <LinkButton to={props.signInHref} kind="primary" size="large" external>
              {t.session.signIn(props.organisation)}
            </LinkButton>
            <p className="mp-help">{t.session.whereTo}</p>
          </div>
          {props.isStandIn && props.people.length > 0 ? <LookRound people={props.people} /> : null}
        </div>
      </main>
      <SettlingPond />
      <footer className="mp-note">
        <span>{t.session.informs}</span>
        <a href={props.helpHref}>{t.session.help}</a>
      </footer>
    </div>
  );
}
