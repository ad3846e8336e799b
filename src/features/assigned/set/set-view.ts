import type {
  AssignedBody,
  ChangeAssigned,
  ReferenceFinding,
  WantedFinding,
} from '@/contract/assigned-sweeps';
import type { KeptSweep } from '@/contract/kept-sweep';

export type SetEdits = Omit<ChangeAssigned, 'baseRevision'>;

/** A sweep with what was changed here over what the server has. */
export type SetView = Omit<AssignedBody, 'people'> & { readonly people: readonly string[] };

export function viewOf(body: AssignedBody, edits: SetEdits): SetView {
  const changed = Object.fromEntries(Object.entries(edits).filter(([, value]) => value !== undefined));
  return { ...body, people: body.people.map((one) => one.id), ...changed };
}

export interface SetPart {
  readonly view: SetView;
  /** Whether what is asked may still change: not once it was opened. */
  readonly fixed: boolean;
  readonly onChange: (edits: SetEdits) => void;
}

export function referenceFor(findings: readonly ReferenceFinding[], id: string): ReferenceFinding {
  return findings.find((one) => one.id === id) ?? { id, value: null, text: '', confirmed: false };
}

/** The reference with one finding replaced; those of findings that are wanted no more are left out. */
export function withReference(view: Pick<SetView, 'reference' | 'wanted'>, next: ReferenceFinding) {
  const findings = view.wanted.map(({ id }) =>
    id === next.id ? next : referenceFor(view.reference.findings, id),
  );
  return { ...view.reference, findings };
}

export interface Candidate {
  readonly parameter: number;
  readonly meaning: string;
}

/** Points of a sweep that a finding could mean, in the order of the parameter. */
export function candidatesFor(sweep: KeptSweep | null, wanted: WantedFinding): readonly Candidate[] {
  if (!sweep || wanted.kind !== 'special point') return [];
  return (sweep[wanted.of]?.points ?? [])
    .filter((point) => point.kind === wanted.point)
    .map(({ parameter, meaning }) => ({ parameter, meaning }));
}

/**
 * The reference after a run: each wanted special point takes the point of its kind nearest to what stood there,
 * or the first; what changes has to be confirmed anew.
 */
export function fillReference(view: Pick<SetView, 'reference' | 'wanted'>, sweep: KeptSweep) {
  const findings = view.wanted.map((wanted) => {
    const before = referenceFor(view.reference.findings, wanted.id);
    if (wanted.kind !== 'special point') return before;
    const near = [...candidatesFor(sweep, wanted)].sort((a, b) =>
      before.value === null
        ? a.parameter - b.parameter
        : Math.abs(a.parameter - before.value) - Math.abs(b.parameter - before.value),
    )[0];
    const value = near?.parameter ?? null;
    return { ...before, value, confirmed: before.confirmed && value === before.value };
  });
  return { findings, sweep };
}
