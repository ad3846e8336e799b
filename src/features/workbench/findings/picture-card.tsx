import { Button } from '@/components/ui/button';
import type { PictureResult } from '@/engine/analyses/contract';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench } from '../state/store';
import { Card } from './card';

const count = (number: number, one: string, many: string) => `${number} ${number === 1 ? one : many}`;

function countsOf({ equilibria, sweep, cycles }: PictureResult): readonly string[] {
  const points = sweep.split.specialPoints.length + cycles.split.specialPoints.length;
  return [
    ...(sweep.split.status === 'needs-period-map'
      ? []
      : [
          count(equilibria.split.equilibria.length, 'equilibrium here', 'equilibria here'),
          count(sweep.split.branches.length, 'branch of equilibria', 'branches of equilibria'),
        ]),
    count(
      cycles.split.branches.length,
      cycles.split.forcingPeriod === null ? 'branch of cycles' : 'branch of the period map',
      cycles.split.forcingPeriod === null ? 'branches of cycles' : 'branches of the period map',
    ),
    count(points, 'special point', 'special points'),
  ];
}

/** What the whole picture holds, in numbers, with the way to its table. */
export function PictureCard() {
  const picture = useWorkbench((state) => state.picture);
  const set = useBenchUi((state) => state.set);
  if (!picture) return null;
  return (
    <Card title="Full picture">
      <p className="text-sm">{countsOf(picture).join(', ')}.</p>
      {picture.status === 'complete' ? null : <p className="mt-1 text-sm text-muted">{picture.message}</p>}
      <Button size="small" className="mt-2" onClick={() => set({ dialog: 'picture' })}>
        Table of all of it
      </Button>
    </Card>
  );
}
