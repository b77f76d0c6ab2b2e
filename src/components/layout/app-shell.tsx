import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { t } from '#src/texts/t.ts';
import { BrandMark } from './brand-mark.tsx';
import { NavWords, type NavWord } from './navigation.tsx';
import { PersonMenu, type Person } from './person-menu.tsx';
import { usePhoneMenu } from './phone-menu.tsx';

export type { NavWord } from './navigation.tsx';
export type { Person } from './person-menu.tsx';

export type AppShellProps = {
  homeHref: string;
  nav: readonly NavWord[];
  /** The search field; a {@link FindField} as a rule. */
  find?: ReactNode;
  /** The site's name, or a Select where the person has several. */
  siteSwitch: ReactNode;
  siteName: string;
  /** `Tue 16 Jun 10:42`, in the site's zone. */
  siteClock: string;
  person: Person;
  onSignOut: () => void;
  waterline?: ReactNode;
  children: ReactNode;
};

/** Header, waterline and the one main landmark every page lives in. */
export function AppShell(props: AppShellProps) {
  const menu = usePhoneMenu(props);
  const clock = (
    <span className="mp-figure">
      <span className="mp-hidden">{t.layout.siteTime(props.siteName)} </span>
      {props.siteClock}
    </span>
  );
  return (
    <>
      <a className="mp-skip" href="#main">
        {t.layout.skip}
      </a>
      <header>
        <div className="mp-header">
          <Link className="mp-brand" to={props.homeHref} aria-label={t.layout.home}>
            <BrandMark size={22} />
            {t.layout.product}
          </Link>
          <nav className="mp-nav" aria-label={t.layout.mainNavigation}>
            <NavWords words={props.nav} />
          </nav>
          <div className="mp-header-end">
            {props.find}
            <span className="mp-site">{props.siteSwitch}</span>
            {clock}
            <PersonMenu person={props.person} onSignOut={props.onSignOut} />
          </div>
          <span className="mp-header-time">{clock}</span>
          {menu.opener}
        </div>
        {menu.panel}
      </header>
      {props.waterline}
      <main id="main" tabIndex={-1}>
        {props.children}
      </main>
    </>
  );
}
