import { Button } from '@/components/ui/button';
import { formatNumber } from '@/graphics/numbers';

import { useWorkbench } from '../state/store';
import { Card } from './card';

/** The same trajectory by the other method, and how far the two differ. */
export function SecondOpinionCard() {
  const opinion = useWorkbench((state) => state.secondOpinion);
  const engine = useWorkbench((state) => state.engine);
  const trajectory = useWorkbench((state) => state.result?.trajectory ?? null);
  if (!trajectory) return null;
  return (
    <Card title="Trust in the trajectory">
      {trajectory.status === 'complete' ? null : <p className="mb-1.5 text-caution">{trajectory.message}</p>}
      <p className="mb-2 text-sm text-muted">
        {trajectory.steps.toLocaleString('en-GB')} steps, {trajectory.rejected.toLocaleString('en-GB')}{' '}
        rejected.
      </p>
      <div role="status">
        {opinion ? (
          <p className="mb-2 text-sm">
            {opinion.message} Largest difference, relative:{' '}
            <span className="figures">{formatNumber(opinion.difference, 2)}</span>
          </p>
        ) : null}
      </div>
      <Button size="small" disabled={!engine} onClick={() => engine?.secondOpinion()}>
        Check with the other method
      </Button>
    </Card>
  );
}
