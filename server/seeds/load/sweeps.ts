import { createHash } from 'node:crypto';

import type { GivenFinding, Reference, WantedFinding } from '@/contract/assigned-sweeps';
import type { KeptSweep, SweepRange } from '@/contract/kept-sweep';
import { roleMay } from '@/contract/rights';
import type { PresetDocument } from '@/engine/schema/preset';

import type { Outcome } from '../../models/review';
import type { LoadPerson } from './people';
import type { LoadPreset } from './presets';
import type { Draw } from './random';
import { A_DAY, LOAD_DAY } from './sizes';

const POINTS = 40;
const WANTED: WantedFinding[] = [
  {
    id: 'point',
    label: 'Where it turns',
    kind: 'special point',
    point: 'fold',
    of: 'split',
    tolerance: { kind: 'relative', amount: 0.05 },
  },
  {
    id: 'density',
    label: 'Density there',
    kind: 'number',
    unit: '1',
    tolerance: { kind: 'absolute', amount: 0.5 },
  },
  { id: 'reading', label: 'What it means', kind: 'reading' },
];

function rangeOf({ parameters }: PresetDocument): SweepRange {
  const [first] = parameters;
  return first && first.min < first.max
    ? { parameter: first.symbol, from: first.min, to: first.max }
    : { parameter: 'spread', from: 0, to: 1 };
}

/** The shape of a kept sweep, with drawn numbers: nothing here is computed. */
function drawKeptSweep(draw: Draw, range: SweepRange, symbol: string, at: Date): KeptSweep {
  const width = range.to - range.from;
  const parameters = Array.from({ length: POINTS }, (_, k) => range.from + (width * k) / (POINTS - 1));
  const height = 1 + draw() * 9;
  return {
    range,
    computedAt: at.toISOString(),
    split: {
      message: 'The end of the range was reached.',
      complete: true,
      thinned: true,
      points: [],
      branches: [
        {
          of: 'equilibria',
          parameters,
          values: { [symbol]: parameters.map((_, k) => height * Math.sqrt(1 + k)) },
          lowest: {},
          attracts: parameters.map(() => 1),
        },
      ],
    },
    twin: null,
  };
}

/** A sweep of a lab from one of its presets. */
export function drawSweep(draw: Draw, supervisor: LoadPerson, preset: LoadPreset, id: string, k: number) {
  const document = JSON.parse(preset.document) as PresetDocument;
  const range = rangeOf(document);
  const openedAt = new Date(LOAD_DAY - (40 - k) * A_DAY);
  const value = range.from + draw() * (range.to - range.from);
  const reference: Reference = {
    findings: [
      { id: 'point', value, text: '', confirmed: true },
      { id: 'density', value: 4, text: '', confirmed: true },
      { id: 'reading', value: null, text: 'It depends on the spread.', confirmed: true },
    ],
    sweep: null,
  };
  return {
    id,
    revision: 3,
    labId: supervisor.labId,
    state: k === 0 ? ('closed' as const) : ('open' as const),
    setById: supervisor.id,
    setByName: supervisor.name,
    presetId: preset.id,
    presetTitle: preset.title,
    presetVersion: 1,
    document: preset.document,
    title: `Sweep ${k + 1}: ${preset.title}`.slice(0, 160),
    brief: 'Sweep the parameter, pin where it turns, and say what it means.',
    range,
    freedom: { parameters: 'all' as const, range: false, model: false },
    wanted: WANTED,
    reference,
    dueAt: new Date(LOAD_DAY + (k - 1) * 30 * A_DAY),
    timeZone: 'Europe/London',
    createdAt: openedAt,
    openedAt,
    closedAt: k === 0 ? new Date(LOAD_DAY) : null,
  };
}
export type LoadSweep = ReturnType<typeof drawSweep>;

const OUTCOMES: readonly Outcome[] = ['agreed', 'differs', 'sent back'];

/** What one person handed in for a sweep, with a review of two in three. */
export function drawHandIn(draw: Draw, sweep: LoadSweep, person: LoadPerson, number: number) {
  const id = `${sweep.id}-${person.id.slice(-4)}-${number}`;
  const handedInAt = new Date(LOAD_DAY - (20 - number - draw()) * A_DAY);
  const document = JSON.parse(sweep.document) as PresetDocument;
  const [first] = sweep.reference.findings;
  const findings: GivenFinding[] = [
    { id: 'point', value: (first?.value ?? 0) * (0.9 + 0.2 * draw()), text: '', pin: null },
    { id: 'density', value: 3 + 2 * draw(), text: '', pin: null },
    { id: 'reading', value: null, text: 'The split comes back and the twin does not.', pin: null },
  ];
  const symbol = document.populations[0]?.classes[0]?.symbol ?? 'x';
  const kept = drawKeptSweep(draw, sweep.range, symbol, handedInAt);
  const frozen = JSON.stringify({ document, range: sweep.range, findings, sweep: kept, note: '' });
  const outcome = OUTCOMES[Math.floor(draw() * 4.5)] ?? null;
  return {
    handIn: {
      id,
      assignedId: sweep.id,
      userId: person.id,
      name: person.name,
      number,
      key: `load-${id}`,
      frozen,
      findings,
      code: createHash('sha256').update(frozen).digest('hex').slice(0, 12),
      late: handedInAt > sweep.dueAt,
      handedInAt,
    },
    outcome,
  };
}

export const doesSweeps = ({ role }: LoadPerson) => roleMay(role, 'do assigned sweeps');
