import { useMemo } from 'react';

import {
  OPEN_WITH_CYCLES,
  OPEN_WITHOUT_CYCLES,
  type Verdict,
  type VerdictEvidence,
} from '@/engine/verdict/contract';
import { formatNumber } from '@/graphics/numbers';
import { joinClasses } from '@/lib/join-classes';

import { cycleEvidence } from '../cycles/cycle-evidence';
import { usePresentCycles } from '../cycles/use-present-cycles';
import { useShownModel } from '../panes/use-shown-model';
import { useWorkbench } from '../state/store';
import { Card } from './card';

/** Below this a margin of rates of order one is rounding. */
const DUST = 1e-12;

function EvidenceTable({ evidence }: { readonly evidence: readonly VerdictEvidence[] }) {
  const cell = (value: number | null) =>
    value === null ? 'none' : value !== 0 && Math.abs(value) < DUST ? '≈ 0' : formatNumber(value, 3);
  return (
    <table className="mt-2 w-full border-collapse text-sm">
      <thead>
        <tr className="text-muted">
          <th scope="col" className="text-left font-normal">
            <span className="sr-only">evidence</span>
          </th>
          <th scope="col" className="pl-2 text-right font-normal">
            pooled
          </th>
          <th scope="col" className="pl-2 text-right font-normal">
            split
          </th>
        </tr>
      </thead>
      {evidence.map((one) => (
        <tbody key={one.label} className="border-t">
          <tr>
            <th scope="rowgroup" colSpan={3} className="pt-1 text-left leading-tight font-normal">
              {one.label}
              {one.unit ? <span className="whitespace-nowrap text-muted"> ({one.unit})</span> : null}
            </th>
          </tr>
          <tr>
            <td />
            <td className="figures pb-0.5 text-right text-[13px] whitespace-nowrap">{cell(one.pooled)}</td>
            <td className="figures pb-0.5 pl-1 text-right text-[13px] font-semibold whitespace-nowrap">
              <span aria-hidden className="font-normal text-muted">
                →{' '}
              </span>
              {cell(one.split)}
            </td>
          </tr>
          {one.note ? (
            <tr>
              <td colSpan={3} className="pb-1 text-xs text-muted">
                {one.note}
              </td>
            </tr>
          ) : null}
        </tbody>
      ))}
    </table>
  );
}

function Reasons({ title, items }: { readonly title: string; readonly items: readonly string[] }) {
  if (items.length === 0) return null;
  return (
    <details className="mt-2 text-sm">
      <summary className="cursor-pointer font-medium">{title}</summary>
      <ul className="mt-1 list-disc pl-5 text-muted">
        {items.map((item) => (
          <li key={item}>{item}</li>
        ))}
      </ul>
    </details>
  );
}

/** Letters beyond which a sentence is set smaller, so that the evidence stays in view. */
const LONG_SENTENCE = 110;

function VerdictBody({
  verdict,
  cycles,
}: {
  readonly verdict: Verdict;
  readonly cycles: readonly VerdictEvidence[];
}) {
  const evidence = [...verdict.evidence, ...cycles];
  const open = verdict.leavesOpen.map((one) =>
    cycles.length > 0 && one === OPEN_WITHOUT_CYCLES ? OPEN_WITH_CYCLES : one,
  );
  return (
    <>
      <p
        className={joinClasses(
          'font-heading leading-snug font-medium',
          verdict.sentence.length > LONG_SENTENCE ? 'text-[1.05rem]' : 'text-xl',
        )}
      >
        {verdict.sentence}
      </p>
      {evidence.length > 0 ? <EvidenceTable evidence={evidence} /> : null}
      <Reasons title="What it rests on" items={verdict.restsOn} />
      <Reasons title="What it leaves open" items={open} />
      {verdict.cautions.map((caution) => (
        <p key={caution} className="mt-2 border-l-2 border-caution pl-2 text-sm text-caution">
          {caution}
        </p>
      ))}
    </>
  );
}

/** The answer to "does the split stabilise?", with what it rests on. */
export function VerdictCard() {
  const verdict = useWorkbench((state) => state.verdict);
  const swept = useWorkbench((state) => state.sweep !== null && !state.sweepOutdated);
  const twin = useWorkbench((state) => state.shownReport?.twin ?? null);
  const model = useShownModel();
  const comparable = twin?.kind === 'lumped' || twin?.kind === 'unlumped';
  const { cycles: split, result: ownResult } = usePresentCycles('split');
  const { cycles: pooled, result: twinResult } = usePresentCycles('twin');
  // While one side is still being followed, that nothing was found there says nothing.
  const known = ownResult?.status === 'complete' && twinResult?.status === 'complete';
  const cycles = useMemo(
    () => (comparable && known ? cycleEvidence(model, split, pooled) : []),
    [comparable, known, model, split, pooled],
  );
  return (
    <Card title="Does the split stabilise?" accent>
      <div role="status" aria-live="polite" aria-atomic="true">
        {verdict ? (
          <VerdictBody verdict={verdict} cycles={cycles} />
        ) : (
          <p className="text-muted">
            {twin ? twin.reason : 'The answer stands here once the model can be computed.'}
          </p>
        )}
      </div>
      {verdict && !swept ? (
        <p className="mt-2 text-sm text-muted">
          Run a sweep from the strip below to learn where cycles set in.
        </p>
      ) : null}
    </Card>
  );
}
