import { formatNumber, formatShort } from '@/graphics/numbers';

import { branchName, quantityName } from '../cycles/cycle-words';
import { presentOrbit, type PresentCycle } from '../cycles/present-cycles';
import { usePresentCycles } from '../cycles/use-present-cycles';
import { useShownModel } from '../panes/use-shown-model';
import { showsTwin } from '../panes/views/view-input';
import { useWorkbench } from '../state/store';
import { Card, Chip } from './card';
import { Multipliers } from './multipliers';

const WORDS = ['repels', 'attracts', 'undecided at this accuracy'] as const;
const TONES = ['bad', 'good', 'plain'] as const;

/** Lowest and highest value of each quantity; under forcing also where the fixed point lies. */
function Extents({
  cycle,
  fixedPoint,
}: {
  readonly cycle: PresentCycle;
  readonly fixedPoint: Float64Array | null;
}) {
  const model = useShownModel();
  const cell = 'figures pl-2 text-right whitespace-nowrap';
  return (
    <table className="w-full border-collapse text-[13px]">
      <thead>
        <tr className="text-muted">
          <th scope="col" className="text-left font-normal">
            <span className="sr-only">density</span>
          </th>
          {fixedPoint ? (
            <th scope="col" className="pl-2 text-right font-normal">
              at t = 0
            </th>
          ) : null}
          <th scope="col" className="pl-2 text-right font-normal">
            lowest
          </th>
          <th scope="col" className="pl-2 text-right font-normal">
            highest
          </th>
        </tr>
      </thead>
      <tbody>
        {cycle.quantities.map((symbol, k) => (
          <tr key={`${symbol}${k}`} className="border-t">
            <th scope="row" className="py-0.5 text-left font-normal">
              {quantityName(model, symbol)}
            </th>
            {fixedPoint ? (
              <td className={cell}>{k < fixedPoint.length ? formatNumber(fixedPoint[k] ?? NaN, 3) : ''}</td>
            ) : null}
            <td className={cell}>{formatNumber(cycle.lowest[k] ?? NaN, 3)}</td>
            <td className={cell}>{formatNumber(cycle.highest[k] ?? NaN, 3)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function PresentCycleSection({
  cycle,
  side,
  of,
}: {
  readonly cycle: PresentCycle;
  readonly side: 'split' | 'twin';
  readonly of: 'cycle' | 'fixed point';
}) {
  const model = useShownModel();
  const branch = useWorkbench((state) => state.cycles?.[side]?.branches[cycle.branch] ?? null);
  if (!branch) return null;
  const forced = of === 'fixed point';
  const n = branch.dimension;
  return (
    <section className="grid gap-1.5 border-t pt-2 first:border-t-0 first:pt-0">
      <p className="first-letter:uppercase">
        {side === 'twin' ? 'Pooled twin, ' : ''}
        {forced ? 'repeats after' : 'period'} <span className="figures">{formatNumber(cycle.period, 4)}</span>{' '}
        {model.timeUnit}
        {forced ? null : <span className="text-muted">, {branchName(branch.origin)}</span>}
      </p>
      <Extents cycle={cycle} fixedPoint={forced ? presentOrbit(branch, cycle).subarray(0, n) : null} />
      <div className="text-sm text-muted">
        <Multipliers values={cycle.multipliers} forced={forced} />
      </div>
      <ul className="flex flex-wrap gap-1.5" aria-label="What is known of it">
        <Chip tone={TONES[cycle.attracts] ?? 'plain'}>{WORDS[cycle.attracts] ?? 'undecided'}</Chip>
        {cycle.exact ? null : <Chip>interpolated</Chip>}
      </ul>
    </section>
  );
}

/** The cycles at the present value; under forcing the fixed points of the period map. */
export function CyclesCard() {
  const split = usePresentCycles('split');
  const twin = usePresentCycles('twin');
  const withTwin = useWorkbench(showsTwin);
  const outdated = useWorkbench((state) => state.sweepOutdated);
  const running = useWorkbench((state) => state.job !== null);
  const { result, value } = split;
  if (!result || outdated) return null;
  const forced = result.forcingPeriod !== null;
  if (result.branches.length === 0 && !forced) return null;
  const title = forced ? 'Fixed points of the period map' : 'Cycles';
  const of = forced ? 'fixed point' : 'cycle';
  return (
    <Card
      title={title}
      aside={
        <span className="text-sm text-muted">
          at {result.parameterKey} = {formatShort(value ?? NaN, 4)}
        </span>
      }
    >
      <div className="grid gap-2">
        {split.cycles.map((cycle) => (
          <PresentCycleSection key={`own${cycle.branch}:${cycle.index}`} cycle={cycle} side="split" of={of} />
        ))}
        {withTwin
          ? twin.cycles.map((cycle) => (
              <PresentCycleSection
                key={`twin${cycle.branch}:${cycle.index}`}
                cycle={cycle}
                side="twin"
                of={of}
              />
            ))
          : null}
        {split.cycles.length === 0 ? (
          <p className="text-muted">
            {result.branches.length > 0
              ? `No ${of} was followed to this value. Drag the strip to where the diagram shows one.`
              : running
                ? 'They are being followed…'
                : result.message}
          </p>
        ) : null}
      </div>
    </Card>
  );
}
