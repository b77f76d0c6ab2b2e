import { useState } from 'react';
import { maxFileBytes } from '#shared/contracts/files.contract.ts';
import { Button } from '#src/components/ui/button.tsx';
import { FileInput } from '#src/components/ui/file-input.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { errorText } from '#src/lib/error-text.ts';
import { t } from '#src/texts/t.ts';
import { useCertificateUpload } from '../use-certificate-upload.ts';

const words = t.metrology;

/** The certificate's file, sent as soon as it is picked so that a fault shows before the record is. */
export function CertificateInput(props: {
  fileId: number | null;
  onFile: (fileId: number | null) => void;
}) {
  const [picked, setPicked] = useState<{ file: File; key: string } | null>(null);
  const upload = useCertificateUpload(props.onFile);
  if (props.fileId !== null && picked !== null) {
    return (
      <Notice kind="pass" role="status">
        {words.uploaded(picked.file.name)}{' '}
        <Button
          kind="link"
          onClick={() => {
            setPicked(null);
            props.onFile(null);
          }}
        >
          {words.removeFile}
        </Button>
      </Notice>
    );
  }
  const failure = errorText(upload.error);
  return (
    <>
      <FileInput
        types={['.pdf', '.png', '.jpg', '.jpeg']}
        maxBytes={maxFileBytes}
        label={words.file}
        onFiles={([file]) => {
          if (file !== undefined) {
            const next = { file, key: crypto.randomUUID() };
            setPicked(next);
            upload.mutate(next);
          }
        }}
      />
      {upload.isPending && picked !== null ? (
        <p className="mp-note" role="status">
          {words.uploading(picked.file.name)}
        </p>
      ) : null}
      {failure === undefined || picked === null ? null : (
        <Notice
          kind="stop"
          role="alert"
          ways={
            <Button
              size="small"
              onClick={() => {
                upload.mutate(picked);
              }}
            >
              {t.ui.retry}
            </Button>
          }
        >
          {failure}
        </Notice>
      )}
    </>
  );
}
