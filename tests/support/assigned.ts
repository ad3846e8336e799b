import { randomUUID } from 'node:crypto';

import type { AssignedBody, ChangeAssigned, HandIn, SaveWork } from '@/contract/assigned-sweeps';
import type { PresetDocument } from '@/engine/schema/preset';

import { DEMO_LAB } from '../../server/seeds/demo';
import { sampleDocument, type Visitor } from './test-server';

const A_DAY = 24 * 60 * 60_000;
export const inDays = (days: number) => new Date(Date.now() + days * A_DAY).toISOString();

/** What no assignee may ever read: the reference value and the words beside it. */
export const SECRET_VALUE = 0.7312468;
export const SECRET_WORDS = 'the hare loses the race';
export const SECRET_FACT = 'a fact that answers the question';

/** A document with an answer in it. */
export const documentWithAnswer = (title = 'Newts in a pond'): PresetDocument => ({
  ...sampleDocument(title),
  notes: SECRET_WORDS,
  knownFacts: [
    {
      kind: 'special-point',
      parameters: {},
      of: 'split',
      sweep: { parameter: 'r', from: 0, to: 2 },
      point: 'fold',
      value: SECRET_VALUE,
      tolerance: 1e-6,
      source: SECRET_FACT,
    },
  ],
});

const RANGE = { parameter: 'r', from: 0, to: 2 };

/** Everything that opening needs. */
export const wantedWork = {
  title: 'Newts under pressure',
  brief: 'Find where the newts go, $r > 0$.',
  range: RANGE,
  wanted: [
    {
      id: 'fold',
      label: 'The fold',
      kind: 'special point',
      point: 'fold',
      of: 'split',
      tolerance: { kind: 'absolute', amount: 0.01 },
    },
    {
      id: 'size',
      label: 'Number of newts',
      kind: 'number',
      unit: '1',
      tolerance: { kind: 'relative', amount: 0.1 },
    },
    { id: 'reading', label: 'What it means', kind: 'reading' },
  ],
  reference: {
    findings: [
      { id: 'fold', value: SECRET_VALUE, text: '', confirmed: true },
      { id: 'size', value: 40, text: '', confirmed: true },
      { id: 'reading', value: null, text: SECRET_WORDS, confirmed: false },
    ],
    sweep: null,
  },
} satisfies Partial<ChangeAssigned>;

/** A draft with everything but people and a date. */
export async function draftSweep(
  supervisor: Visitor,
  presetId: string,
  change: Partial<ChangeAssigned> = {},
): Promise<AssignedBody> {
  const made = await supervisor.post(`/labs/${DEMO_LAB.id}/assigned`, { presetId, version: 1 });
  const { id, revision } = made.body as AssignedBody;
  const changed = await supervisor.send('patch', `/assigned/${id}`, {
    baseRevision: revision,
    ...wantedWork,
    ...change,
  });
  if (changed.status !== 200) throw new Error(JSON.stringify(changed.body));
  return changed.body as AssignedBody;
}

export async function openSweep(
  supervisor: Visitor,
  presetId: string,
  people: string[],
  change: Partial<ChangeAssigned> = {},
): Promise<AssignedBody> {
  const { id, revision } = await draftSweep(supervisor, presetId, { people, dueAt: inDays(7), ...change });
  const opened = await supervisor.post(`/assigned/${id}/open`, { baseRevision: revision });
  if (opened.status !== 200) throw new Error(JSON.stringify(opened.body));
  return opened.body as AssignedBody;
}

export const workBody = (baseRevision = 0, more: Partial<SaveWork> = {}): SaveWork => ({
  baseRevision,
  document: sampleDocument(),
  range: RANGE,
  findings: [],
  runs: [],
  ...more,
});

export const handInBody = (more: Partial<HandIn> = {}): HandIn => ({
  key: randomUUID(),
  document: sampleDocument(),
  range: RANGE,
  findings: [
    { id: 'fold', value: 0.732, text: '', pin: { kind: 'fold', of: 'split', parameter: 0.732 } },
    { id: 'size', value: 41, text: '', pin: null },
    { id: 'reading', value: null, text: 'They go down.', pin: null },
  ],
  sweep: null,
  note: '',
  ...more,
});
