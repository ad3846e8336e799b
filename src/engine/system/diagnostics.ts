import type { PresetDocument } from '../schema/preset';
import { checkFlows } from './check-flows';
import { checkReferences } from './check-references';
import { checkSymbols } from './check-symbols';
import { checkTraits } from './check-traits';
import { checkUnits } from './check-units';
import { checkUse } from './check-use';
import { checkConstants } from './constants-of-motion';
import type { Diagnostic } from './contract';
import { buildModelGraph, type GraphResult } from './model-graph';

const RANK = { error: 0, warning: 1, note: 2 } as const;

/**
 * Everything that can be said of a definition, each remark at its place: errors (which keep the model
 * from being compiled) first, then warnings, then notes. Errors of one formula hide what would follow
 * from them: units and flows are looked at only once the formulas can be built.
 */
export function checkDefinition(
  document: PresetDocument,
  built: GraphResult = buildModelGraph(document),
): readonly Diagnostic[] {
  const found: Diagnostic[] = [
    ...checkSymbols(document),
    ...built.errors,
    ...checkTraits(document),
    ...checkReferences(document),
    ...checkUse(document),
  ];
  if (built.model !== null) {
    found.push(...checkFlows(built.model), ...checkConstants(built.model), ...checkUnits(document));
  }
  return found
    .map((remark, k) => ({ remark, k }))
    .sort((a, b) => RANK[a.remark.severity] - RANK[b.remark.severity] || a.k - b.k)
    .map(({ remark }) => remark);
}
