import { Check } from 'lucide-react';
import { useState, type ReactNode } from 'react';
import { Link } from 'react-router-dom';

import { Button, buttonClasses } from '@/components/ui/button';
import type { PresetDocument, TemplateName } from '@/engine/schema/preset';
import { templateNamed } from '@/engine/schema/templates';
import { joinClasses } from '@/lib/join-classes';

import { TemplateDialog } from '../rail/processes/template-dialog';
import { AddTrait } from '../rail/traits/add-trait';
import { useWorkbench } from '../state/store';
import { useBenchUi } from './bench-ui';
import { ClassNames } from './class-names';
import { NewPopulation } from './new-population';

/** A model without populations or without processes has nothing to show yet. */
export function isUnbegun(document: PresetDocument): boolean {
  return document.populations.length === 0 || document.processes.length === 0;
}

/** Processes that most models begin with, in the order they are wanted. */
const FIRST_TEMPLATES: readonly TemplateName[] = ['logistic-births', 'predation', 'deaths', 'competition'];

interface StepProps {
  readonly number: number;
  readonly title: string;
  readonly done: boolean;
  /** What has to come first; null where the step can be taken. */
  readonly waitsFor: string | null;
  readonly children: ReactNode;
}

function Step({ number, title, done, waitsFor, children }: StepProps) {
  return (
    <li className="grid grid-cols-[2rem_minmax(0,1fr)] gap-x-3 border-t border-hairline py-4 first:border-t-0">
      <span
        className={joinClasses(
          'figures grid size-7 place-items-center rounded-full border text-sm',
          done ? 'border-accent bg-accent text-accent-ink' : 'border-hairline text-muted',
        )}
      >
        {done ? <Check size={15} role="img" aria-label={`Step ${number}, done`} /> : number}
      </span>
      <div className="grid gap-2">
        <h3 className="text-lg">{title}</h3>
        {waitsFor === null ? children : <p className="text-sm text-muted">{waitsFor}</p>}
      </div>
    </li>
  );
}

function FirstProcesses() {
  const [template, setTemplate] = useState<TemplateName | null>(null);
  return (
    <>
      <p className="text-sm text-muted">
        Each writes formulas that you can edit. All others are in the rail.
      </p>
      <div className="flex flex-wrap gap-2">
        {FIRST_TEMPLATES.map((name) => (
          <Button key={name} size="small" onClick={() => setTemplate(name)}>
            {templateNamed(name).label}
          </Button>
        ))}
      </div>
      {template ? <TemplateDialog name={template} earlier={null} onClose={() => setTemplate(null)} /> : null}
    </>
  );
}

/** An empty bench that leads: populations, classes, traits, processes, or equations as text. */
export function StartGuide() {
  const document = useWorkbench((state) => state.document);
  const set = useBenchUi((state) => state.set);
  const hasPopulations = document.populations.length > 0;
  const waits = hasPopulations ? null : 'After the first population.';
  return (
    <div className="h-full overflow-y-auto px-4 py-10">
      <section
        aria-labelledby="start-guide"
        className="mx-auto max-w-2xl rounded-lg border bg-raised px-6 py-6"
      >
        <h2 id="start-guide" className="text-2xl">
          Begin a model
        </h2>
        <p className="mt-1 text-muted">
          Plots appear with the first process. Everything can be changed and undone later.
        </p>
        <ol className="mt-4">
          <Step number={1} title="Name a population" done={hasPopulations} waitsFor={null}>
            <NewPopulation />
          </Step>
          <Step
            number={2}
            title="Split it into classes, if it is split"
            done={document.populations.some((one) => one.classes.length > 1)}
            waitsFor={waits}
          >
            <ClassNames />
          </Step>
          <Step number={3} title="Add traits by class" done={document.traits.length > 0} waitsFor={waits}>
            <p className="text-sm text-muted">
              Mortality, attack rates, shares of births. Templates also add those they need.
            </p>
            <AddTrait />
          </Step>
          <Step number={4} title="Add processes" done={document.processes.length > 0} waitsFor={waits}>
            <FirstProcesses />
          </Step>
        </ol>
        <div className="flex flex-wrap items-center gap-2 border-t border-hairline pt-4">
          <span className="text-muted">Or</span>
          <Button onClick={() => set({ dialog: 'equations' })}>Type equations as text</Button>
          <Link to="/presets?kind=starter" className={buttonClasses('plain')}>
            Open a starter preset
          </Link>
        </div>
      </section>
    </div>
  );
}
