import type { Equilibrium } from '@/engine/equilibria/contract';
import type { PresetDocument } from '@/engine/schema/preset';
import { formatNumber } from '@/graphics/numbers';

import { equilibriumName } from '../panes/equilibrium-words';
import { listClassNames } from '../panes/views/view-input';
import { Card, Chip } from './card';
import { eigenvalueTexts } from './eigenvalue-texts';

const tone = (attracts: Equilibrium['attracts']) =>
  attracts === 'yes' ? ('good' as const) : attracts === 'no' ? ('bad' as const) : ('plain' as const);

function invasionWords(
  populations: PresetDocument['populations'],
  invasion: Equilibrium['invasions'][number],
): string {
  const name = populations.find((one) => one.symbol === invasion.population)?.name || invasion.population;
  if (invasion.answer === 'not-invariant') return `absence of ${name} does not last`;
  if (invasion.answer === 'undecided') return `${name}: invasion undecided`;
  return `${name} ${invasion.answer}`;
}

interface EquilibriumCardProps {
  readonly equilibrium: Equilibrium;
  readonly model: PresetDocument;
  /** For a lumped twin: names of its states. */
  readonly stateNames?: readonly string[];
  readonly twin?: boolean;
}

export function EquilibriumCard({ equilibrium, model, stateNames, twin = false }: EquilibriumCardProps) {
  const names = stateNames ?? listClassNames(model).map((one) => one.name);
  const eigenvalues = eigenvalueTexts(equilibrium.eigenvalues);
  const name = equilibriumName(model.populations, equilibrium.absent);
  return (
    <Card title={twin ? `${name}, pooled twin` : name}>
      <dl className="grid grid-cols-[1fr_auto] gap-x-3">
        {names.map((label, k) => (
          <div key={label} className="col-span-2 grid grid-cols-subgrid border-t py-0.5 first:border-t-0">
            <dt>{label}</dt>
            <dd className="figures text-right">{formatNumber(equilibrium.state[k] ?? NaN, 4)}</dd>
          </div>
        ))}
        <div className="col-span-2 grid grid-cols-subgrid border-t py-0.5">
          <dt>eigenvalues</dt>
          <dd className="figures text-right whitespace-pre-line">
            {eigenvalues.length > 0 ? eigenvalues.join('\n') : 'none exist'}
          </dd>
        </div>
        {equilibrium.compositionModes.length > 0 ? (
          <div className="col-span-2 grid grid-cols-subgrid border-t py-0.5 text-muted">
            <dt>composition alone</dt>
            <dd className="figures text-right whitespace-pre-line">
              {eigenvalueTexts(equilibrium.compositionModes).join('\n')}
            </dd>
          </div>
        ) : null}
      </dl>
      <ul className="mt-2 flex flex-wrap gap-1.5" aria-label="What is known of it">
        <Chip tone={tone(equilibrium.attracts)}>{equilibrium.type}</Chip>
        <Chip>{equilibrium.feasible ? 'feasible' : 'not feasible'}</Chip>
        {equilibrium.invasions.map((one) => (
          <Chip key={one.population}>
            <span title={one.reason}>
              {invasionWords(model.populations, one)}
              {one.growthRate !== null ? ` (${formatNumber(one.growthRate, 3)})` : ''}
            </span>
          </Chip>
        ))}
      </ul>
      {equilibrium.notes.map((note) => (
        <p key={note} className="mt-1.5 text-sm text-muted">
          {note}
        </p>
      ))}
    </Card>
  );
}
