import type { CyclesResult } from '@/engine/cycles/contract';
import type { SweepResult } from '@/engine/continuation/contract';
import { formatShort } from '@/graphics/numbers';

import { branchName } from '../cycles/cycle-words';
import { equilibriumName } from '../panes/equilibrium-words';
import { useShownModel } from '../panes/use-shown-model';
import { showsTwin } from '../panes/views/view-input';
import { useWorkbench } from '../state/store';
import { Card } from './card';

interface Ends {
  readonly startEnd: { readonly message: string };
  readonly endEnd: { readonly message: string };
  readonly parameters: Float64Array;
}

function Row({ name, branch }: { readonly name: string; readonly branch: Ends }) {
  const { parameters, startEnd, endEnd } = branch;
  const low = parameters.reduce((a, b) => Math.min(a, b), Infinity);
  const high = parameters.reduce((a, b) => Math.max(a, b), -Infinity);
  return (
    <li className="border-t py-1 first:border-t-0">
      <p>
        {name}{' '}
        <span className="figures text-xs whitespace-nowrap text-muted">
          {formatShort(low, 4)} to {formatShort(high, 4)}
        </span>
      </p>
      <p className="text-muted">
        {startEnd.message} {endEnd.message === startEnd.message ? '' : endEnd.message}
      </p>
    </li>
  );
}

function Side({ sweep, cycles }: { readonly sweep: SweepResult; readonly cycles: CyclesResult | null }) {
  const { populations } = useShownModel();
  return (
    <ul className="text-sm">
      {sweep.branches.map((branch, k) => (
        <Row key={`rest${k}`} name={equilibriumName(populations, branch.absent)} branch={branch} />
      ))}
      {cycles?.branches.map((branch, k) => {
        const name = branchName(branch.origin);
        return <Row key={`cycles${k}`} name={name.charAt(0).toUpperCase() + name.slice(1)} branch={branch} />;
      })}
    </ul>
  );
}

/** Every branch that was followed, how far, and why it ends where it ends. */
export function BranchesCard() {
  const sweep = useWorkbench((state) => state.sweep);
  const cycles = useWorkbench((state) => state.cycles);
  const withTwin = useWorkbench(showsTwin);
  if (!sweep) return null;
  const count = sweep.split.branches.length + (cycles?.split.branches.length ?? 0);
  if (count === 0) return null;
  return (
    <Card title="Branches" aside={<span className="text-sm text-muted">{count} followed</span>}>
      <details className="text-sm">
        <summary className="cursor-pointer font-medium">How far they reach, and why they end</summary>
        <div className="mt-1">
          <Side sweep={sweep.split} cycles={cycles?.split ?? null} />
        </div>
      </details>
      {withTwin && sweep.twin ? (
        <details className="mt-1.5 text-sm">
          <summary className="cursor-pointer font-medium">Those of the pooled twin</summary>
          <div className="mt-1">
            <Side sweep={sweep.twin} cycles={cycles?.twin ?? null} />
          </div>
        </details>
      ) : null}
    </Card>
  );
}
