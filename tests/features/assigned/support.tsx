import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import type { ComponentType } from 'react';
import { createMemoryRouter, RouterProvider } from 'react-router-dom';
import { vi } from 'vitest';

import type { AssignedBody, ReviewedHandIn } from '@/contract/assigned-sweeps';
import type { KeptModel, KeptSweep } from '@/contract/kept-sweep';
import { saturatingTwoSexPredator } from '@/presets/saturating-two-sex-predator';

export interface Asked {
  readonly method: string;
  readonly path: string;
  readonly body: Record<string, unknown>;
}
type Answer = (asked: Asked) => { readonly status?: number; readonly body: unknown } | undefined;

export const ADA = {
  id: 'ada',
  name: 'Ada',
  email: 'ada@demo.invalid',
  demo: true,
  memberships: [{ labId: 'lab', labName: 'Fen lab', role: 'supervisor' }],
};

/** A server of a few answers; every question but that of the session is kept. */
export function answerWith(answer: Answer): Asked[] {
  const asked: Asked[] = [];
  vi.stubGlobal('fetch', async (path: string, init: RequestInit = {}) => {
    if (path === '/api/session') return Response.json({ user: ADA, csrfToken: 'token', demo: true });
    const text = typeof init.body === 'string' ? init.body : '{}';
    const question: Asked = { method: init.method ?? 'GET', path, body: JSON.parse(text) as Asked['body'] };
    asked.push(question);
    const given = answer(question);
    if (!given)
      return Response.json({ error: { code: 'not-found', message: 'Nothing is here.' } }, { status: 404 });
    return Response.json(given.body, { status: given.status ?? 200 });
  });
  return asked;
}

/** A page at an address, with the places that it leads to as their addresses. */
export function renderPage(Page: ComponentType, path: string, at: string) {
  const router = createMemoryRouter(
    [
      { path, element: <Page /> },
      { path: '*', element: <p>elsewhere</p> },
    ],
    { initialEntries: [at] },
  );
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const shown = render(
    <QueryClientProvider client={client}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
  );
  return { ...shown, router, user: userEvent.setup() };
}

export function keptModel(points: readonly (readonly ['Hopf' | 'fold', number])[]): KeptModel {
  return {
    message: 'Complete.',
    complete: true,
    thinned: false,
    points: points.map(([kind, parameter]) => ({
      kind,
      parameter,
      state: { x: 0.4, y1: 0.1, y2: 0.1 },
      period: kind === 'Hopf' ? 17 : null,
      meaning: `The meaning of ${parameter}.`,
    })),
    branches: [
      {
        of: 'equilibria',
        parameters: [0.5, 1, 1.3, 2],
        values: { x: [0.3, 0.4, 0.4, 0.4], y1: [0, 0.1, 0.1, 0.1], y2: [0, 0.1, 0.1, 0.1] },
        lowest: {},
        attracts: [1, 1, 0, 0],
      },
      {
        of: 'cycles',
        parameters: [1.3, 1.6, 2],
        values: { x: [0.4, 1, 1.5], y1: [0.1, 0.2, 0.3], y2: [0.1, 0.2, 0.3] },
        lowest: { x: [0.4, 0.2, 0.1], y1: [0.1, 0, 0], y2: [0.1, 0, 0] },
        attracts: [1, 1, 1],
      },
    ],
  };
}

export function keptSweep(hopf = 1.3247706): KeptSweep {
  return {
    range: { parameter: 'K', from: 0.5, to: 2 },
    computedAt: '2026-11-30T12:00:00.000Z',
    split: keptModel([['Hopf', hopf]]),
    twin: null,
  };
}

const HOPF = {
  id: 'w1',
  kind: 'special point',
  label: 'Onset of cycles',
  point: 'Hopf',
  of: 'split',
  tolerance: { kind: 'relative', amount: 0.01 },
} as const;

export function assignedBody(change: Partial<AssignedBody> = {}): AssignedBody {
  return {
    id: 'a1',
    revision: 1,
    lab: { id: 'lab', name: 'Fen lab' },
    state: 'draft',
    setBy: { id: 'ada', name: 'Ada' },
    preset: { id: 'p1', title: 'Midges', version: 3 },
    document: saturatingTwoSexPredator,
    title: 'Onset of cycles',
    brief: '',
    range: { parameter: 'K', from: 0.5, to: 2 },
    freedom: { parameters: [], range: false, model: false },
    wanted: [HOPF],
    reference: { findings: [], sweep: null },
    dueAt: null,
    timeZone: 'Europe/Berlin',
    people: [],
    createdAt: '2026-11-30T12:00:00.000Z',
    openedAt: null,
    closedAt: null,
    obstacles: ['It has no due date.'],
    ...change,
  };
}

export function handIn(change: Partial<ReviewedHandIn> = {}): ReviewedHandIn {
  const receipt = { number: 1, handedInAt: '2026-11-30T13:00:00.000Z', late: false, code: '0123456789ab' };
  return {
    id: 'h1',
    ...receipt,
    document: saturatingTwoSexPredator,
    range: { parameter: 'K', from: 0.5, to: 2 },
    findings: [{ id: 'w1', value: 1.33, text: '', pin: null }],
    sweep: keptSweep(),
    note: 'Done twice.',
    person: { id: 'sanna', name: 'Sanna' },
    assigned: { id: 'a1', title: 'Onset of cycles', labId: 'lab' },
    wanted: [HOPF],
    reference: {
      findings: [{ id: 'w1', value: 1.3247706, text: '', confirmed: true }],
      sweep: keptSweep(),
    },
    proposals: { w1: { judgement: 'agrees', reason: '1.33 against 1.32477: within 0.0132.' } },
    changes: ['r is locked no more.'],
    review: null,
    all: [{ id: 'h1', ...receipt, outcome: null }],
    ...change,
  };
}
