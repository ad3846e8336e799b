import { Plus } from 'lucide-react';
import { useState } from 'react';

import { Menu, MenuItem, MenuLabel, MenuSeparator } from '@/components/layout/menu';
import { Button } from '@/components/ui/button';
import { listClasses } from '@/engine/schema/document-symbols';
import { removeGroup } from '@/engine/schema/edit';
import { LIMITS } from '@/engine/schema/limits';
import type { Process, TemplateName } from '@/engine/schema/preset';
import { TEMPLATES, templateNamed } from '@/engine/schema/templates';

import { useWorkbench } from '../../state/store';
import { RailSection } from '../rail-section';
import { classInWords } from '../traits/common-traits';
import { addFreeEquation, addFreeProcess, groupProcesses, type ProcessGroup } from './process-edits';
import { ProcessRow } from './process-row';
import { TemplateDialog } from './template-dialog';

/** What the template dialog is to write: anew, or in the place of an earlier use. */
interface TemplateUse {
  readonly name: TemplateName;
  readonly earlier: Process['template'];
}

function Group({ group, onChange }: { readonly group: ProcessGroup; readonly onChange: () => void }) {
  const edit = useWorkbench((state) => state.edit);
  const rows = group.indices.map((index) => <ProcessRow key={index} index={index} />);
  if (!group.template) return rows;
  const label = templateNamed(group.template.name).label;
  return (
    <li className="border-l-2 border-hairline pl-2">
      <div className="flex items-center justify-between text-sm text-muted">
        <span>{label}</span>
        <span>
          <Button look="quiet" size="small" aria-label={`Change settings of ${label}`} onClick={onChange}>
            Change
          </Button>
          <Button
            look="quiet"
            size="small"
            aria-label={`Delete all of ${label}`}
            onClick={() => edit(`Delete ${label}`, (d) => removeGroup(d, group.group ?? ''))}
          >
            Delete all
          </Button>
        </span>
      </div>
      <ul className="grid gap-1.5">{rows}</ul>
    </li>
  );
}

function AddProcessMenu({ onTemplate }: { readonly onTemplate: (name: TemplateName) => void }) {
  const document = useWorkbench((state) => state.document);
  const edit = useWorkbench((state) => state.edit);
  const classes = listClasses(document).map((one) => one.class.symbol);
  const first = classes[0];
  const full = document.processes.length >= LIMITS.processes;
  return (
    <Menu
      trigger={
        <Button look="quiet" size="small" aria-label="Add process" disabled={first === undefined || full}>
          <Plus size={14} aria-hidden /> Process
        </Button>
      }
    >
      <MenuLabel>From a template</MenuLabel>
      {TEMPLATES.map((template) => (
        <MenuItem key={template.name} onSelect={() => onTemplate(template.name)}>
          {template.label}
        </MenuItem>
      ))}
      <MenuSeparator />
      <MenuLabel>By hand</MenuLabel>
      <MenuItem onSelect={() => edit('Add process', (d) => addFreeProcess(d, first ?? ''))}>
        Process with a rate and effects
      </MenuItem>
      {classes.slice(0, 12).map((symbol) => (
        <MenuItem
          key={symbol}
          onSelect={() => edit(`Add equation of ${symbol}`, (d) => addFreeEquation(d, symbol))}
        >
          Equation d{symbol}/dt of {classInWords(document, symbol)}
        </MenuItem>
      ))}
    </Menu>
  );
}

export function ProcessSection() {
  const processes = useWorkbench((state) => state.document.processes);
  const [use, setUse] = useState<TemplateUse | null>(null);
  return (
    <RailSection
      name="processes"
      title="Processes"
      aside={processes.length > 0 ? String(processes.length) : null}
      actions={<AddProcessMenu onTemplate={(name) => setUse({ name, earlier: null })} />}
    >
      {processes.length === 0 ? (
        <p className="text-sm text-muted">
          No processes yet. Births, deaths and predation can be written from templates; any rate can be
          written by hand.
        </p>
      ) : (
        <ul className="grid gap-2.5">
          {groupProcesses(processes).map((group) => (
            <Group
              key={`${group.group ?? 'own'}:${group.indices[0]}`}
              group={group}
              onChange={() => {
                if (group.template) setUse({ name: group.template.name, earlier: group.template });
              }}
            />
          ))}
        </ul>
      )}
      {use ? <TemplateDialog name={use.name} earlier={use.earlier} onClose={() => setUse(null)} /> : null}
    </RailSection>
  );
}
