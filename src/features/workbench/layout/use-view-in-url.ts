import { useEffect, useRef } from 'react';
import { useSearchParams } from 'react-router-dom';

import { useWorkbench, useWorkbenchStore, type Arrangement, type SweepSelection } from '../state/store';

const ARRANGEMENTS: readonly Arrangement[] = ['explore', 'sweep', 'two-parameters', 'long-run', 'model'];

/** `K:0.5:6`, the parameter's key first; a dial's key holds a colon of its own. */
export function readSweep(text: string | null): SweepSelection | null {
  const shape = /^(.{1,80}):(-?[\d.e+-]+):(-?[\d.e+-]+)$/i.exec(text ?? '');
  if (!shape) return null;
  const [, parameter = '', from, to] = shape;
  const selection = { parameter, from: Number(from), to: Number(to) };
  return Number.isFinite(selection.from) && selection.from < selection.to ? selection : null;
}

export function writeSweep(selection: SweepSelection): string {
  return `${selection.parameter}:${selection.from}:${selection.to}`;
}

/** Keeps the view in the address, so that a link opens what its sender saw. */
export function useViewInUrl(): void {
  const store = useWorkbenchStore();
  const [parameters, setParameters] = useSearchParams();
  const arrangement = useWorkbench((state) => state.arrangement);
  const sweep = useWorkbench((state) => state.sweepSelection);
  const read = useRef(false);

  useEffect(() => {
    if (!read.current) {
      read.current = true;
      const view = ARRANGEMENTS.find((one) => one === parameters.get('view'));
      const selection = readSweep(parameters.get('sweep'));
      store.getState().set({
        ...(view ? { arrangement: view } : {}),
        ...(selection ? { sweepSelection: selection } : {}),
      });
      return;
    }
    const timer = window.setTimeout(() => {
      const next = new URLSearchParams(parameters);
      if (arrangement === 'explore') next.delete('view');
      else next.set('view', arrangement);
      if (sweep) next.set('sweep', writeSweep(sweep));
      else next.delete('sweep');
      if (next.toString() !== parameters.toString()) setParameters(next, { replace: true });
    }, 300);
    return () => window.clearTimeout(timer);
  }, [arrangement, sweep, parameters, setParameters, store]);
}
