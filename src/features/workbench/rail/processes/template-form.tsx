import { useId } from 'react';

import { CheckField } from '@/components/fields/check-field';
import { FieldMessage } from '@/components/fields/field-message';
import { NumberField } from '@/components/fields/number-field';
import { SelectField } from '@/components/fields/select-field';
import { COMPACT_HEIGHT, COMPACT_INPUT } from '@/components/fields/field-styles';
import type { TemplateField, TemplateProblem } from '@/engine/schema/templates';
import { joinClasses } from '@/lib/join-classes';

import { useWorkbench } from '../../state/store';
import { classInWords } from '../traits/common-traits';

type Settings = Readonly<Record<string, unknown>>;

interface TemplateFormProps {
  readonly fields: readonly TemplateField[];
  readonly settings: Settings;
  readonly problems: readonly TemplateProblem[];
  readonly onChange: (field: string, value: unknown) => void;
}

interface FieldProps<K extends TemplateField['kind']> {
  readonly field: Extract<TemplateField, { kind: K }>;
  readonly settings: Settings;
  readonly error: string | undefined;
  readonly onChange: (value: unknown) => void;
}

const textOf = (value: unknown): string => (typeof value === 'string' ? value : '');
const listOf = (value: unknown): readonly string[] =>
  Array.isArray(value) ? value.filter((one): one is string => typeof one === 'string') : [];

function SeveralField(props: {
  readonly label: string;
  readonly help: string;
  readonly error: string | undefined;
  readonly choices: readonly { readonly value: string; readonly label: string }[];
  readonly chosen: readonly string[];
  readonly onChange: (chosen: readonly string[]) => void;
}) {
  const { chosen, onChange } = props;
  return (
    <fieldset className="grid gap-0.5">
      <legend className="mb-0.5 text-sm font-medium">{props.label}</legend>
      {props.choices.map((choice) => (
        <CheckField
          key={choice.value}
          label={choice.label}
          checked={chosen.includes(choice.value)}
          onChange={(on) =>
            onChange(on ? [...chosen, choice.value] : chosen.filter((one) => one !== choice.value))
          }
        />
      ))}
      {props.error ? <FieldMessage>{props.error}</FieldMessage> : null}
      {props.help ? <p className="text-sm text-muted">{props.help}</p> : null}
    </fieldset>
  );
}

function SymbolField({ field, settings, error, onChange }: FieldProps<'symbol'>) {
  const id = useId();
  const document = useWorkbench((state) => state.document);
  const known =
    field.of === 'trait'
      ? document.traits.map((one) => ({ symbol: one.symbol, name: one.name }))
      : document.parameters.map((one) => ({ symbol: one.symbol, name: one.name }));
  return (
    <div className="grid gap-1">
      <label htmlFor={id} className="text-sm font-medium">
        {field.label}
      </label>
      <input
        id={id}
        list={`${id}-known`}
        value={textOf(settings[field.name])}
        placeholder={field.suggestion}
        autoComplete="off"
        spellCheck={false}
        aria-invalid={error ? true : undefined}
        aria-describedby={`${id}-help`}
        className={joinClasses('figures w-full', COMPACT_HEIGHT, COMPACT_INPUT)}
        onChange={(event) => onChange(event.target.value.trim())}
      />
      <datalist id={`${id}-known`}>
        {known.map((one) => (
          <option key={one.symbol} value={one.symbol}>
            {one.name}
          </option>
        ))}
      </datalist>
      <div id={`${id}-help`}>
        {error ? <FieldMessage>{error}</FieldMessage> : <p className="text-sm text-muted">{field.help}</p>}
      </div>
    </div>
  );
}

function FieldOf({ field, settings, error, onChange }: FieldProps<TemplateField['kind']>) {
  const document = useWorkbench((state) => state.document);
  const populations = document.populations.map((one) => ({
    value: one.symbol,
    label: one.name || one.symbol,
  }));
  const classesOf = (symbol: string) =>
    (document.populations.find((one) => one.symbol === symbol)?.classes ?? []).map((one) => ({
      value: one.symbol,
      label: classInWords(document, one.symbol),
    }));
  const { label, help } = field;
  const value = settings[field.name];
  switch (field.kind) {
    case 'population':
      return (
        <SelectField
          label={label}
          help={help}
          error={error}
          value={textOf(value)}
          choices={populations}
          onChange={onChange}
        />
      );
    case 'populations':
      return (
        <SeveralField
          label={label}
          help={help}
          error={error}
          choices={populations}
          chosen={listOf(value)}
          onChange={onChange}
        />
      );
    case 'class': {
      const classes = classesOf(textOf(settings[field.population]));
      const choices = field.optional ? [{ value: '', label: 'any' }, ...classes] : classes;
      return (
        <SelectField
          label={label}
          help={help}
          error={error}
          value={textOf(value)}
          choices={choices}
          onChange={onChange}
        />
      );
    }
    case 'classes': {
      const classes = classesOf(textOf(settings[field.population]));
      if (classes.length < 2) return null;
      return (
        <SeveralField
          label={label}
          help={help}
          error={error}
          choices={classes}
          chosen={listOf(value)}
          onChange={onChange}
        />
      );
    }
    case 'choice':
      return (
        <SelectField
          label={label}
          help={help}
          error={error}
          value={textOf(value)}
          choices={field.options}
          onChange={onChange}
        />
      );
    case 'boolean':
      return <CheckField label={label} help={help} checked={value === true} onChange={onChange} />;
    case 'number':
      return (
        <NumberField
          visibleLabel
          label={label}
          value={typeof value === 'number' ? value : null}
          error={error}
          check={(next) =>
            next >= field.min && next <= field.max ? null : `It lies from ${field.min} to ${field.max}.`
          }
          onCommit={onChange}
        />
      );
    case 'symbol':
      return <SymbolField field={field} settings={settings} error={error} onChange={onChange} />;
  }
}

/** A form generated from a template's fields. */
export function TemplateForm({ fields, settings, problems, onChange }: TemplateFormProps) {
  return fields
    .filter((field) => {
      const shown = field.shownWhen;
      return !shown || shown.is.includes(String(settings[shown.field]));
    })
    .map((field) => (
      <FieldOf
        key={field.name}
        field={field}
        settings={settings}
        error={problems.find((one) => one.field === field.name)?.message}
        onChange={(value) => onChange(field.name, value)}
      />
    ));
}
