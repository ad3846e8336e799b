import { useMemo } from 'react';

import type { Diagnostic } from '@/engine/system/contract';

import { useWorkbench } from '../state/store';
import { pathKey } from './rail-state';

const RANK = { error: 0, warning: 1, note: 2 } as const;

/** Those of a list that concern a field, gravest first; with `beneath` also those of what it holds. */
export function diagnosticsAt(
  all: readonly Diagnostic[],
  path: readonly (string | number)[],
  beneath: boolean,
): readonly Diagnostic[] {
  const key = pathKey(path);
  return all
    .filter((one) => {
      const at = pathKey(one.path);
      return at === key || (beneath && at.startsWith(`${key}.`));
    })
    .sort((a, b) => RANK[a.severity] - RANK[b.severity]);
}

const NONE: readonly Diagnostic[] = [];

/** What the last report says about a field of the document. */
export function useDiagnostics(path: readonly (string | number)[], beneath = false): readonly Diagnostic[] {
  const all = useWorkbench((state) => state.report?.diagnostics ?? NONE);
  const key = pathKey(path);
  return useMemo(() => diagnosticsAt(all, key.split('.'), beneath), [all, key, beneath]);
}
