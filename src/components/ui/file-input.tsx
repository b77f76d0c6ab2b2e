import { useState, type DragEvent } from 'react';
import { formatBytes } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import { useFieldControl } from './field.tsx';
import { Mark } from './mark.tsx';

type FileRules = {
  /** Endings with their dot, as the `accept` attribute wants them: `['.csv', '.pdf']`. */
  types: readonly string[];
  maxBytes: number;
};

/** The sentence that refuses a file, or `undefined` where it may go on. */
export function refuseFile(
  file: { name: string; size: number },
  { types, maxBytes }: FileRules,
): string | undefined {
  const name = file.name.toLowerCase();
  if (!types.some((type) => name.endsWith(type.toLowerCase()))) {
    return t.ui.fileWrongType(file.name, types.join(', '));
  }
  if (file.size > maxBytes) {
    return t.ui.fileTooLarge(file.name, formatBytes(file.size), formatBytes(maxBytes));
  }
  return undefined;
}

export type FileInputProps = FileRules & {
  onFiles: (files: readonly File[]) => void;
  multiple?: boolean | undefined;
  /** Needed outside a Field. */
  label?: string | undefined;
};

/** Drop or pick; types and size are said beforehand and a file against them is refused by name. */
export function FileInput(props: FileInputProps) {
  const [isOver, setIsOver] = useState(false);
  const [refusals, setRefusals] = useState<readonly string[]>([]);
  const { attributes } = useFieldControl({});
  const take = (list: FileList | null) => {
    const files = Array.from(list ?? []).slice(0, props.multiple ? undefined : 1);
    const judged = files.map((file) => ({ file, refusal: refuseFile(file, props) }));
    setRefusals(judged.flatMap(({ refusal }) => refusal ?? []));
    const accepted = judged.filter(({ refusal }) => refusal === undefined);
    if (accepted.length > 0) {
      props.onFiles(accepted.map(({ file }) => file));
    }
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setIsOver(false);
    take(event.dataTransfer.files);
  };
  return (
    <div
      className="mp-drop"
      data-over={isOver}
      onDragOver={(event) => {
        event.preventDefault();
        setIsOver(true);
      }}
      onDragLeave={() => {
        setIsOver(false);
      }}
      onDrop={drop}
    >
      <p>{props.multiple ? t.ui.fileMany : t.ui.fileDrop}</p>
      <input
        {...attributes}
        type="file"
        aria-label={props.label}
        accept={props.types.join(',')}
        multiple={props.multiple}
        onChange={(event) => {
          take(event.target.files);
        }}
      />
      <p className="mp-help">
        {t.ui.fileTypes(props.types.join(', '))} {t.ui.fileLimit(formatBytes(props.maxBytes))}
      </p>
      <div aria-live="polite">
        {refusals.map((refusal) => (
          <p className="mp-error" key={refusal}>
            <Mark name="stop" tone="brick" />
            <span>{refusal}</span>
          </p>
        ))}
      </div>
    </div>
  );
}
