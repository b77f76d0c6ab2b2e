import { useMemo, type ReactNode } from 'react';
import { useLocation, useNavigate } from 'react-router-dom';
import { AppShell, type NavWord } from '#src/components/layout/app-shell.tsx';
import { FindField } from '#src/components/layout/find-field.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { useNow } from '#src/hooks/use-now.ts';
import { SiteContext, type SiteContextValue } from '#src/hooks/use-site.ts';
import { formatInstant, siteCalendar } from '#src/lib/format-date.ts';
import { t } from '#src/texts/t.ts';
import type { SessionDto } from '#shared/contracts/session.contract.ts';
import { SiteWaterline } from './site-waterline.tsx';

type Site = SessionDto['sites'][number];

function navWords(site: string, pathname: string): NavWord[] {
  const words = t.shell.nav;
  const root = `/${site}`;
  const entries = [
    [words.today, root],
    [words.board, `${root}/board`],
    [words.requests, `${root}/requests`],
    [words.bookings, `${root}/bookings`],
    [words.equipment, `${root}/equipment`],
    [words.metrology, `${root}/metrology`],
    [words.settings, `${root}/settings`],
    [words.help, `${root}/help`],
  ] as const;
  return entries.map(([word, to]) => ({
    word,
    to,
    isCurrent: to === root ? pathname === root : pathname === to || pathname.startsWith(`${to}/`),
  }));
}

function SiteSwitch(props: { site: Site; sites: readonly Site[] }) {
  const navigate = useNavigate();
  if (props.sites.length < 2) {
    return props.site.name;
  }
  return (
    <Select
      aria-label={t.layout.site}
      emptyLabel={null}
      value={props.site.code}
      onChange={(event) => {
        void navigate(`/${event.target.value}`);
      }}
      options={props.sites.map((site) => ({ value: site.code, label: site.name }))}
    />
  );
}

/** Header, waterline and the page of one site, for the person signed in. */
export function SiteShell(props: {
  session: SessionDto;
  siteCode: string;
  onSignOut: () => void;
  children: ReactNode;
}) {
  const { session } = props;
  const { pathname } = useLocation();
  const navigate = useNavigate();
  const nowMs = useNow();
  const site = session.sites.find((entry) => entry.code === props.siteCode);
  const { person } = session;
  const value = useMemo<SiteContextValue | null>(
    () =>
      site === undefined || person === null
        ? null
        : {
            code: site.code,
            name: site.name,
            zone: site.zone,
            roles: site.roles,
            actor: person,
            personName: person.name,
          },
    [site, person],
  );
  if (value === null || site === undefined) {
    return null;
  }
  const roleWord = site.roles.map((role) => t.shell.roles[role]).join(', ');
  return (
    <SiteContext value={value}>
      <AppShell
        homeHref={`/${site.code}`}
        nav={navWords(site.code, pathname)}
        find={
          <FindField
            onFind={(text) => {
              void navigate(`/${site.code}/find?text=${encodeURIComponent(text)}`);
            }}
          />
        }
        siteSwitch={<SiteSwitch site={site} sites={session.sites} />}
        siteName={site.name}
        siteClock={formatInstant(nowMs, {
          zone: site.zone,
          currentYear: siteCalendar(nowMs, site.zone).currentYear,
        })}
        person={{ name: value.personName, role: roleWord === '' ? t.shell.noRole : roleWord }}
        onSignOut={props.onSignOut}
        waterline={<SiteWaterline />}
      >
        {props.children}
      </AppShell>
    </SiteContext>
  );
}
