import type { SiteScope } from '#server/actor.ts';
import type { MailMessage } from '#server/integrations/mail.ts';
import { formatSiteDay } from '#shared/domain/calendar/format-site-day.ts';
import { daysUntil } from '#shared/domain/reminders/days-until.ts';
import type { DutyKind } from '#shared/domain/states.ts';
import type { StandingItem } from './digests.repository.ts';

const dutyWords: Readonly<Record<DutyKind, string>> = {
  calibration: 'Calibration',
  'intermediate-check': 'Intermediate check',
  maintenance: 'Maintenance',
  mapping: 'Temperature mapping',
};

type Digest = {
  readonly site: SiteScope;
  /** `YYYY-MM-DD` at the site. */
  readonly today: string;
  readonly publicUrl: string;
  readonly items: readonly StandingItem[];
};
type Line = {
  readonly what: string;
  readonly duty: string;
  readonly when: string;
  readonly href: string;
};
type Group = { readonly title: string; readonly lines: readonly Line[] };

/** The mail in plain text and in HTML, both saying the same. */
export function writeDigestMail(digest: Digest): Pick<MailMessage, 'subject' | 'text' | 'html'> {
  const overdue = digest.items.filter((item) => daysUntil(digest.today, item.dueOn) < 0);
  const ahead = digest.items.filter((item) => daysUntil(digest.today, item.dueOn) >= 0);
  const groups = [
    groupOf('Overdue', digest, overdue),
    groupOf('Falling due', digest, ahead),
  ].filter((group) => group.lines.length > 0);
  const counts = [
    overdue.length > 0 ? `${overdue.length} overdue` : null,
    ahead.length > 0 ? `${ahead.length} falling due` : null,
  ].filter((part) => part !== null);
  const { site, publicUrl } = digest;
  return {
    subject: `${site.name}: ${counts.join(', ')}`,
    text: writeText(digest, groups, `${publicUrl}/${site.code}/metrology`),
    html: writeHtml(digest, groups, `${publicUrl}/${site.code}/metrology`),
  };
}

function groupOf(title: string, digest: Digest, items: readonly StandingItem[]): Group {
  const { site, publicUrl, today } = digest;
  return {
    title,
    lines: items.map((item) => ({
      what: `${item.tag}, ${item.model}`,
      duty: [dutyWords[item.dutyKind], item.channel, item.range]
        .filter((part) => part !== null)
        .join(', '),
      when: `${formatSiteDay(item.dueOn)}, ${sayDays(daysUntil(today, item.dueOn))}`,
      href: `${publicUrl}/${site.code}/equipment/${encodeURIComponent(item.tag)}`,
    })),
  };
}

function sayDays(daysLeft: number): string {
  switch (daysLeft) {
    case 0:
      return 'today';
    case 1:
      return 'tomorrow';
    case -1:
      return 'yesterday';
    default:
      return daysLeft > 0 ? `in ${daysLeft} days` : `${-daysLeft} days ago`;
  }
}

const heading = ({ site, today }: Digest) => `Duties at ${site.name}, ${formatSiteDay(today)}`;
const reasonLine = ({ site }: Digest) =>
  `You get this because you keep one of these instruments or are a metrologist at ${site.name}.`;
const cautionLine = 'Mail may come late. What holds now is shown here:';

function writeText(digest: Digest, groups: readonly Group[], metrologyUrl: string): string {
  const parts = groups.map(({ title, lines }) =>
    [
      title,
      ...lines.map(
        ({ what, duty, when, href }) => `\n  ${what}\n  ${duty}, due ${when}\n  ${href}`,
      ),
    ].join('\n'),
  );
  return [
    heading(digest),
    ...parts,
    reasonLine(digest),
    `${cautionLine}\n${metrologyUrl}`,
    '',
  ].join('\n\n');
}

const cell = 'padding:6px 16px 6px 0;border-top:1px solid #d3d9d4;vertical-align:top';

function writeHtml(digest: Digest, groups: readonly Group[], metrologyUrl: string): string {
  const title = escapeHtml(heading(digest));
  const tables = groups.map(
    (group) => `<h2 style="font-size:16px;margin:24px 0 6px">${escapeHtml(group.title)}</h2>
<table style="border-collapse:collapse">
<tr>${['Instrument', 'Duty', 'Due']
      .map(
        (name) =>
          `<th scope="col" style="padding:0 16px 4px 0;text-align:left;font-weight:normal;color:#3f5257">${name}</th>`,
      )
      .join('')}</tr>
${group.lines.map(writeRow).join('\n')}
</table>`,
  );
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${title}</title></head>
<body style="margin:0;padding:24px;font-family:sans-serif;font-size:15px;line-height:1.5;color:#14262b;background:#fff">
<h1 style="font-size:20px;margin:0">${title}</h1>
${tables.join('\n')}
<p style="margin:24px 0 0;color:#3f5257">${escapeHtml(reasonLine(digest))}<br>
${escapeHtml(cautionLine)} <a href="${escapeHtml(metrologyUrl)}" style="color:#22533c">${escapeHtml(metrologyUrl)}</a></p>
</body></html>
`;
}

function writeRow({ what, duty, when, href }: Line): string {
  const link = `<a href="${escapeHtml(href)}" style="color:#22533c">${escapeHtml(what)}</a>`;
  return `<tr>${[link, escapeHtml(duty), escapeHtml(when)]
    .map((content) => `<td style="${cell}">${content}</td>`)
    .join('')}</tr>`;
}

function escapeHtml(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
}
