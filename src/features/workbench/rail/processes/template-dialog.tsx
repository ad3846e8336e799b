import { useMemo, useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import type { PresetDocument, Process, TemplateName } from '@/engine/schema/preset';
import { applyTemplate, templateNamed } from '@/engine/schema/templates';

import { useWorkbench } from '../../state/store';
import { TemplateForm } from './template-form';
import { TemplatePreview } from './template-preview';

interface TemplateDialogProps {
  readonly name: TemplateName;
  readonly earlier: Process['template'];
  readonly onClose: () => void;
}

type Settings = Readonly<Record<string, unknown>>;

/** Defaults, with the first population in every field that needs one. */
function initialSettings(name: TemplateName, document: PresetDocument): Settings {
  const template = templateNamed(name);
  const settings: Record<string, unknown> = { ...template.defaults() };
  const symbols = document.populations.map((one) => one.symbol);
  // The consumer is most often written after what it eats.
  let next = name === 'predation' ? symbols.length - 1 : 0;
  for (const field of template.fields) {
    if (field.kind === 'population') settings[field.name] = symbols[next] ?? '';
    if (field.kind === 'populations')
      settings[field.name] = symbols
        .filter((symbol) => !Object.values(settings).includes(symbol))
        .slice(0, 1);
    if (field.kind === 'population') next = 0;
  }
  return settings;
}

/** A template's settings as a form, with what it would write beside it. */
export function TemplateDialog({ name, earlier, onClose }: TemplateDialogProps) {
  const template = templateNamed(name);
  const document = useWorkbench((state) => state.document);
  const edit = useWorkbench((state) => state.edit);
  const [settings, setSettings] = useState<Settings>(() =>
    earlier ? { ...template.defaults(), ...earlier.settings } : initialSettings(name, document),
  );
  const [tried, setTried] = useState(false);
  const outcome = useMemo(
    () => applyTemplate(document, name, settings, earlier?.group),
    [document, name, settings, earlier],
  );
  const problems = outcome.ok || !tried ? [] : outcome.problems;

  const handleWrite = () => {
    if (!outcome.ok) return setTried(true);
    edit(`${earlier ? 'Change' : 'Add'} ${template.label.toLowerCase()}`, () => outcome.document);
    onClose();
  };

  return (
    <Dialog
      open
      onOpenChange={(open) => (open ? undefined : onClose())}
      title={template.label}
      description={template.description}
      width="wide"
    >
      <form
        className="grid gap-6 md:grid-cols-[20rem_minmax(0,1fr)]"
        onSubmit={(event) => {
          event.preventDefault();
          handleWrite();
        }}
      >
        <div className="grid content-start gap-3">
          <TemplateForm
            fields={template.fields}
            settings={settings}
            problems={problems}
            onChange={(field, value) => setSettings({ ...settings, [field]: value })}
          />
          {problems
            .filter((one) => one.field === '')
            .map((one) => (
              <FieldMessage key={one.message}>{one.message}</FieldMessage>
            ))}
        </div>
        <div className="grid gap-4 self-start md:sticky md:top-0">
          <TemplatePreview outcome={outcome} />
          <div className="flex justify-end gap-2">
            {earlier ? (
              <p className="mr-auto text-sm text-muted">Changes by hand to these processes are replaced.</p>
            ) : null}
            <Button onClick={onClose}>Cancel</Button>
            <Button type="submit" look="primary">
              {earlier ? 'Write again' : 'Add'}
            </Button>
          </div>
        </div>
      </form>
    </Dialog>
  );
}
