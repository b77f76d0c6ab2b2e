import { Link } from 'react-router-dom';
import { paths } from '#src/app/paths.ts';
import { Page, Section } from '#src/components/layout/page.tsx';
import { Kbd } from '#src/components/ui/kbd.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { Table } from '#src/components/ui/table.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { t } from '#src/texts/t.ts';

const words = t.help;

function Guides() {
  return (
    <Section title={words.jobs}>
      <div className="grid gap-x-8 gap-y-6 md:grid-cols-2">
        {words.guides.map((guide) => (
          <div key={guide.title}>
            <h3>{guide.title}</h3>
            <ol className="list-decimal pl-5">
              {guide.steps.map((step) => (
                <li key={step} className="mt-1">
                  {step}
                </li>
              ))}
            </ol>
          </div>
        ))}
      </div>
    </Section>
  );
}

function Science() {
  return (
    <Section title={words.science}>
      <div className="mp-stack">
        {words.formulas.map((entry) => (
          <div key={entry.title}>
            <h3>{entry.title}</h3>
            <p className="max-w-[78ch]">{entry.text}</p>
            <p className="my-1 font-mono">{entry.formula}</p>
            <p className="mp-note max-w-[78ch]">{entry.source}</p>
          </div>
        ))}
      </div>
    </Section>
  );
}

/** Guides, formulas, words, keys and cautions. */
export function HelpPage() {
  const site = useSite();
  return (
    <Page
      title={words.title}
      intro={
        <>
          <p>{words.intro}</p>
          <p>
            <Link to={paths.marks.href(site.code)}>{words.marks}</Link>{' '}
            <span className="mp-note">{words.marksText}</span>
          </p>
        </>
      }
    >
      <Section title={words.caution}>
        <div className="max-w-[100ch]">
          {words.cautions.map((caution) => (
            <Notice key={caution} kind="caution">
              {caution}
            </Notice>
          ))}
        </div>
      </Section>
      <Guides />
      <Science />
      <Section title={words.words}>
        <Table
          caption={words.words}
          rows={words.glossary}
          rowKey={([word]) => word}
          columns={[
            { key: 'word', head: words.wordHead, nowrap: true, cell: ([word]) => <b>{word}</b> },
            { key: 'meaning', head: words.meaningHead, cell: ([, meaning]) => meaning },
          ]}
        />
      </Section>
      <Section title={words.keys}>
        <Table
          caption={words.keys}
          rows={words.keyList}
          rowKey={([key]) => key}
          columns={[
            { key: 'key', head: words.keyHead, width: 120, cell: ([key]) => <Kbd>{key}</Kbd> },
            { key: 'does', head: words.doesHead, cell: ([, does]) => does },
          ]}
        />
        <p className="mp-note mt-4">{words.licence}</p>
      </Section>
    </Page>
  );
}
