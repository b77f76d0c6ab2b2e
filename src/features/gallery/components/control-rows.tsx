import { useState } from 'react';
import { Section } from '#src/components/layout/page.tsx';
import { Button } from '#src/components/ui/button.tsx';
import { Choice } from '#src/components/ui/choice.tsx';
import { Dialog } from '#src/components/ui/dialog.tsx';
import { Field } from '#src/components/ui/field.tsx';
import { FileInput } from '#src/components/ui/file-input.tsx';
import { DateTimeInput, NumberInput } from '#src/components/ui/input.tsx';
import { Notice } from '#src/components/ui/notice.tsx';
import { ThemeSwitch } from '#src/components/ui/theme-switch.tsx';
import { Tick } from '#src/components/ui/tick.tsx';
import { t } from '#src/texts/t.ts';

const { controls } = t.gallery;
const ranges = ['day', 'week', 'fortnight'] as const;
const results = ['screening', 'settled'] as const;

function Buttons() {
  const [isAsking, setIsAsking] = useState(false);
  const close = () => {
    setIsAsking(false);
  };
  return (
    <div className="mp-acts">
      <Button kind="primary">{controls.ask}</Button>
      <Button>{controls.keep}</Button>
      <Button kind="danger">{controls.out}</Button>
      <Button why={controls.sendWhy}>{controls.send}</Button>
      <Button
        onClick={() => {
          setIsAsking(true);
        }}
      >
        {controls.dialog}
      </Button>
      <Button kind="link">{controls.link}</Button>
      <Dialog
        isOpen={isAsking}
        title={controls.dialogTitle}
        confirmLabel={controls.dialogConfirm}
        onConfirm={close}
        onClose={close}
      >
        {controls.dialogText}
      </Dialog>
    </div>
  );
}

function Fields() {
  const [result, setResult] = useState<(typeof results)[number]>('settled');
  return (
    <div className="max-w-[400px]">
      <Field label={controls.temperature} help={controls.temperatureHelp}>
        <NumberInput defaultValue="45.0" unit="°C" />
      </Field>
      <Field label={controls.temperature} error={controls.temperatureError}>
        <NumberInput defaultValue="75.0" unit="°C" />
      </Field>
      <Field label={controls.result} as="group">
        <Choice
          full
          options={results.map((value) => ({ value, label: controls[value] }))}
          value={result}
          onChange={setResult}
        />
      </Field>
      <Field label={controls.notBefore}>
        <DateTimeInput defaultValue="2026-06-17T08:00" />
      </Field>
      <Field label={controls.shown} as="group">
        <div className="mp-tick-row">
          <Tick defaultChecked>{controls.chambers}</Tick>
          <Tick>{controls.sources}</Tick>
        </div>
      </Field>
      <Field label={controls.log}>
        <FileInput types={['.csv', '.txt']} maxBytes={50_000_000} onFiles={() => undefined} />
      </Field>
    </div>
  );
}

export function ControlRows() {
  const [range, setRange] = useState<(typeof ranges)[number]>('week');
  const { notices } = controls;
  return (
    <Section title={controls.title} note={controls.note}>
      <div className="mp-stack">
        <Buttons />
        <div className="mp-acts">
          <Choice
            label={controls.range.label}
            options={ranges.map((value) => ({ value, label: controls.range[value] }))}
            value={range}
            onChange={setRange}
          />
          <ThemeSwitch />
        </div>
        <Fields />
        <div className="max-w-[640px]">
          <Notice kind="stop" title={notices.stopTitle}>
            {notices.stop}
          </Notice>
          <Notice kind="caution" title={notices.cautionTitle}>
            {notices.caution}
          </Notice>
          <Notice kind="pass" title={notices.passTitle}>
            {notices.pass}
          </Notice>
        </div>
      </div>
    </Section>
  );
}
