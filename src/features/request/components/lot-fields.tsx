import type { CellTypeDto } from '#shared/contracts/registers.contract.ts';
import { Button } from '#src/components/ui/button.tsx';
import { Choice } from '#src/components/ui/choice.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { DateTimeInput, NumberInput } from '#src/components/ui/input.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { Select } from '#src/components/ui/select.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { useSite } from '#src/hooks/use-site.ts';
import { parseFigure } from '#src/lib/format-number.ts';
import { formatAh } from '#src/lib/format-quantity.ts';
import { t } from '#src/texts/t.ts';
import { cautionsOf } from '../cautions.view.ts';
import type { LotDraft, RequestDraft } from '../request-draft.view.ts';
import { CellPicker } from './cell-picker.tsx';

const words = t.request;

export type LotFieldsProps = {
  draft: RequestDraft;
  lot: LotDraft;
  place: number;
  cellTypes: readonly CellTypeDto[];
  errorOf: (pointer: string) => string | undefined;
  onChange: (change: Partial<LotDraft>) => void;
  onRemove: (() => void) | undefined;
};

function Cells(props: LotFieldsProps) {
  const { lot, place, errorOf, onChange, draft } = props;
  const at = `#/lots/${place}`;
  return (
    <>
      <Field as="group" label={words.by}>
        <Choice
          options={[
            { value: 'number', label: words.byNumber },
            { value: 'serial', label: words.bySerial },
          ]}
          value={lot.by}
          onChange={(by) => {
            onChange({ by });
          }}
        />
      </Field>
      {lot.by === 'number' ? (
        <Field label={words.cellCount} error={errorOf(`${at}/cellCount`)}>
          <NumberInput
            unit={words.cellsUnit}
            value={lot.cellCount}
            onChange={(event) => {
              onChange({ cellCount: event.target.value });
            }}
          />
        </Field>
      ) : (
        <Field
          as="group"
          label={words.cellCount}
          help={words.cellsHelp}
          error={errorOf(`${at}/cellIds`) ?? errorOf(`${at}/cellCount`)}
        >
          <CellPicker
            cellTypeId={lot.cellTypeId === '' ? null : Number(lot.cellTypeId)}
            projectId={draft.projectId === '' ? null : Number(draft.projectId)}
            chosen={lot.cells}
            onChange={(cells) => {
              onChange({ cells });
            }}
          />
        </Field>
      )}
    </>
  );
}

function Condition(props: LotFieldsProps) {
  const { lot, place, errorOf, onChange } = props;
  const site = useSite();
  const at = `#/lots/${place}`;
  return (
    <>
      <Field label={words.stateOfCharge} error={errorOf(`${at}/stateOfChargePct`)}>
        <NumberInput
          unit="%"
          value={lot.stateOfChargePct}
          onChange={(event) => {
            onChange({ stateOfChargePct: event.target.value });
          }}
        />
      </Field>
      <Field
        label={words.rested}
        help={`${words.restedHelp} ${words.zone(site.zone)}`}
        error={errorOf(`${at}/restedSinceAt`)}
        optional
      >
        <DateTimeInput
          value={lot.restedSince}
          onChange={(event) => {
            onChange({ restedSince: event.target.value });
          }}
        />
      </Field>
      <Field label={words.storage} error={errorOf(`${at}/storageTemperatureC`)} optional>
        <NumberInput
          unit="°C"
          value={lot.storageTemperatureC}
          onChange={(event) => {
            onChange({ storageTemperatureC: event.target.value });
          }}
        />
      </Field>
      <Tick
        checked={lot.isDamaged}
        onChange={(event) => {
          onChange({ isDamaged: event.target.checked });
        }}
      >
        {words.damaged}
      </Tick>
    </>
  );
}

/** One lot of equal cells: which, how many, in what condition. */
export function LotFields(props: LotFieldsProps) {
  const { lot, place, cellTypes, errorOf, onChange, draft } = props;
  const cellType = cellTypes.find((each) => String(each.id) === lot.cellTypeId);
  const cautions = cautionsOf({
    cellType,
    stateOfChargePct: parseFigure(lot.stateOfChargePct) ?? null,
    setTemperatureC: parseFigure(draft.setTemperatureC) ?? null,
    isDamaged: lot.isDamaged,
  });
  return (
    <fieldset className="mb-4">
      {draft.lots.length === 1 ? null : (
        <legend className="mb-1 flex items-baseline gap-3">
          <b>{words.lot(place + 1)}</b>
          {props.onRemove === undefined ? null : (
            <Button kind="link" onClick={props.onRemove}>
              {words.removeLot}
            </Button>
          )}
        </legend>
      )}
      <Field
        label={words.cellType}
        error={errorOf(`#/lots/${place}/cellTypeId`)}
        help={
          cellType === undefined
            ? undefined
            : words.cellTypeFacts(
                cellType.format,
                formatAh(cellType.capacityAh),
                cellType.hazardLevel,
              )
        }
      >
        <Select
          value={lot.cellTypeId}
          options={cellTypes.map((each) => ({
            value: String(each.id),
            label: `${each.name}, ${each.format}, ${formatAh(each.capacityAh)}`,
          }))}
          onChange={(event) => {
            onChange({ cellTypeId: event.target.value, cells: [] });
          }}
        />
      </Field>
      <Cells {...props} />
      <Condition {...props} />
      {cautions.map((caution) => (
        <Notice key={caution} kind="caution">
          {caution}
        </Notice>
      ))}
    </fieldset>
  );
}
