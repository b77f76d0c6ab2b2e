import { downloadFile } from '#shared/contracts/files.contract.ts';
import type { CalibrationDto } from '#shared/contracts/calibrations.contract.ts';
import { Section } from '#src/components/layout/page.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { formatBytes } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';

const words = t.metrology;

/** The certificate as it arrived: pictures in the page, a PDF in the browser's own reader. */
export function CertificateSection(props: { record: CalibrationDto }) {
  const site = useSite();
  const { file } = props.record;
  if (file === null) {
    return (
      <Section title={words.certificate}>
        <p className="mp-note">{words.noFile}</p>
      </Section>
    );
  }
  const address = downloadFile.path.replace(':site', site.code).replace(':id', String(file.id));
  return (
    <Section title={words.certificate}>
      <p>
        {words.fileFacts(file.name, formatBytes(file.sizeBytes))}{' '}
        <a className="ml-3" href={address} target="_blank" rel="noreferrer">
          {words.openFile}
        </a>
      </p>
      <p className="mp-note font-mono break-all">{words.checksum(file.sha256)}</p>
      {file.mediaType === 'application/pdf' ? null : (
        <img
          className="mt-3 max-h-[720px] max-w-full border border-[var(--rule)]"
          src={address}
          alt={words.certificateImage(props.record.certificateNumber)}
        />
      )}
    </Section>
  );
}
