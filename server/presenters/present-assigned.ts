import type {
  AssignedBody,
  HandIn as HandInBody,
  OwnHandIn,
  Receipt,
  Review as ReviewBody,
  ReviewedHandIn,
  SaveWork,
  Task,
  WorkState,
} from '@/contract/assigned-sweeps';
import { proposeJudgement } from '@/contract/agreement';
import { changedNumbers, structureChanged, withoutAnswers } from '@/contract/locks';
import type { PresetDocument } from '@/engine/schema/preset';

import type { AssignedPerson } from '../models/assigned-person';
import type { AssignedSweep } from '../models/assigned-sweep';
import type { AssignedWork } from '../models/assigned-work';
import type { HandIn } from '../models/hand-in';
import type { Review } from '../models/review';

type Frozen = Omit<HandInBody, 'key'>;

const iso = (date: Date | null) => date?.toISOString() ?? null;
const labOf = ({ labId, lab }: AssignedSweep) => ({ id: labId, name: lab?.name ?? '' });
const documentOf = ({ document }: AssignedSweep) => JSON.parse(document) as PresetDocument;

export const presentReceipt = ({ id, number, handedInAt, late, code }: HandIn): Receipt => ({
  ...{ id, number, late, code },
  handedInAt: handedInAt.toISOString(),
});

export interface PersonAsPresented {
  readonly id: string;
  readonly name: string;
  readonly state: WorkState;
  readonly member: boolean;
}

/** For those who set sweeps: the reference is in it. */
export function presentAssigned(
  assigned: AssignedSweep,
  people: readonly PersonAsPresented[],
  obstacles: readonly string[],
): AssignedBody {
  const { id, revision, state, setById, setByName, title, brief, range, freedom, wanted, reference } =
    assigned;
  const { presetId, presetTitle, presetVersion, timeZone } = assigned;
  return {
    ...{ id, revision, state, title, brief, range, freedom, wanted, reference, timeZone },
    lab: labOf(assigned),
    setBy: setById === null ? null : { id: setById, name: setByName },
    preset: { id: presetId, title: presetTitle, version: presetVersion },
    document: documentOf(assigned),
    dueAt: iso(assigned.dueAt),
    people: [...people],
    createdAt: assigned.createdAt.toISOString(),
    openedAt: iso(assigned.openedAt),
    closedAt: iso(assigned.closedAt),
    obstacles: [...obstacles],
  };
}

function presentReview(review: Review | null | undefined): ReviewBody | null {
  if (!review) return null;
  const { revision, judgements, remarks, outcome, note, byName, at } = review;
  return { revision, judgements, remarks, outcome, note, by: byName, at: at.toISOString() };
}

const presentFrozen = (handIn: HandIn) => ({
  ...(JSON.parse(handIn.frozen) as Frozen),
  ...presentReceipt(handIn),
});

/** One's own: a review that was not given back is not in it. */
const presentOwnHandIn = (handIn: HandIn): OwnHandIn => ({
  ...presentFrozen(handIn),
  review: handIn.review?.outcome ? presentReview(handIn.review) : null,
});

function presentWork(work: AssignedWork | null): Task['work'] {
  if (work === null) return null;
  const content = JSON.parse(work.content) as Omit<SaveWork, 'baseRevision'>;
  return { ...content, revision: work.revision, savedAt: work.savedAt.toISOString() };
}

/** For whom it is for: without answers, and with the reference only after closing and judging. */
export function presentTask(
  assigned: AssignedSweep,
  { state: mine }: AssignedPerson,
  work: AssignedWork | null,
  handIns: readonly HandIn[],
): Task {
  const { id, state, setByName, title, brief, range, freedom, wanted, timeZone } = assigned;
  const judged = mine === 'agreed' || mine === 'differs';
  return {
    ...{ id, state, title, brief, range, freedom, wanted, timeZone, mine },
    lab: labOf(assigned),
    setBy: setByName,
    document: withoutAnswers(documentOf(assigned)),
    dueAt: iso(assigned.dueAt),
    work: presentWork(work),
    handIns: handIns.map(presentOwnHandIn),
    reference: judged && state === 'closed' ? assigned.reference : null,
  };
}

/** How a hand-in differs from what was set. */
function changesOf(assigned: AssignedSweep, { document, range }: Frozen): string[] {
  const set = documentOf(assigned);
  const { parameter, from, to } = range;
  const moved =
    parameter !== assigned.range.parameter || from !== assigned.range.from || to !== assigned.range.to;
  return [
    ...(structureChanged(set, document)
      ? ['The classes, processes or formulas of the model were changed.']
      : []),
    ...changedNumbers(set, document),
    ...(moved ? [`The sweep ran over ${parameter} from ${from} to ${to}.`] : []),
  ];
}

/** For reviewers: exactly as it was handed in, with what the tool proposes now. */
export function presentReviewedHandIn(
  assigned: AssignedSweep,
  handIn: HandIn,
  person: { id: string; name: string },
  all: readonly HandIn[],
): ReviewedHandIn {
  const { id, title, labId, wanted, reference } = assigned;
  const frozen = presentFrozen(handIn);
  return {
    ...frozen,
    person,
    assigned: { id, title, labId },
    wanted,
    reference,
    proposals: Object.fromEntries(
      wanted.map((one) => [
        one.id,
        proposeJudgement(
          one,
          reference.findings.find((expected) => expected.id === one.id),
          frozen.findings.find((given) => given.id === one.id),
        ),
      ]),
    ),
    changes: changesOf(assigned, frozen),
    review: presentReview(handIn.review),
    all: all.map((one) => ({ ...presentReceipt(one), outcome: one.review?.outcome ?? null })),
  };
}
