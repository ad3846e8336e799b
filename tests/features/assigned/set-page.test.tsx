import { fireEvent, screen, waitFor, within } from '@testing-library/react';
import { afterEach, describe, expect, it, vi } from 'vitest';

import type { AssignedBody } from '@/contract/assigned-sweeps';
import SetPage from '@/features/assigned/set/set-page';
import { createLocalEngine } from '@/workers/local-engine';

import { answerWith, assignedBody, renderPage, type Asked } from './support';

vi.mock('@/workers/client', () => ({ createEngineClient: () => createLocalEngine() }));
afterEach(() => void vi.unstubAllGlobals());

const LAB = {
  id: 'lab',
  name: 'Fen lab',
  role: 'supervisor',
  members: [
    { id: 'ada', name: 'Ada', role: 'supervisor', email: null, joinedAt: null },
    { id: 'sanna', name: 'Sanna', role: 'student', email: null, joinedAt: null },
    { id: 'rui', name: 'Rui', role: 'researcher', email: null, joinedAt: null },
  ],
};

/** A server with one sweep; `meanwhile` is what another saved. */
function serve(initial = assignedBody()) {
  let there = initial;
  const asked = answerWith(({ method, path, body }) => {
    if (path === '/api/labs/lab') return { body: LAB };
    if (path === '/api/assigned/a1' && method === 'GET') return { body: there };
    if (path === '/api/assigned/a1' && method === 'PATCH') {
      const { baseRevision, people, ...rest } = body as { baseRevision: number; people?: string[] };
      if (baseRevision !== there.revision)
        return { status: 409, body: { error: { code: 'conflict', message: 'It was changed meanwhile.' } } };
      there = {
        ...there,
        ...(rest as Partial<AssignedBody>),
        ...(people
          ? { people: people.map((id) => ({ id, name: id, state: 'untouched' as const, member: true })) }
          : {}),
        revision: there.revision + 1,
      };
      return { body: there };
    }
    if (path === '/api/assigned/a1/open') {
      there = { ...there, state: 'open', revision: there.revision + 1, obstacles: [] };
      return { body: there };
    }
    return undefined;
  });
  return {
    asked,
    there: () => there,
    meanwhile: (change: Partial<AssignedBody>) =>
      (there = { ...there, ...change, revision: there.revision + 1 }),
  };
}

const patches = (asked: readonly Asked[]) => asked.filter(({ method }) => method === 'PATCH');
const open = async () => {
  const page = renderPage(SetPage, '/assigned/:id/set', '/assigned/a1/set');
  await screen.findByRole('heading', { name: /Set a sweep/ });
  return page;
};
const settled = () =>
  waitFor(() => expect(screen.getByText('Saved')).toBeInTheDocument(), { timeout: 5_000 });

describe('the editor of an assigned sweep', () => {
  it('saves by itself, with the revision that was read', async () => {
    const { asked, there } = serve();
    const { user } = await open();
    await user.type(screen.getByRole('textbox', { name: 'Brief' }), 'Raise it.');
    expect(screen.getByText('Saving')).toBeInTheDocument();
    await settled();
    expect(there().brief).toBe('Raise it.');
    expect(patches(asked)[0]?.body.baseRevision).toBe(1);
  });

  it('adds, orders and removes findings, and keeps the references of those that stay', async () => {
    const { there } = serve(
      assignedBody({
        reference: { findings: [{ id: 'w1', value: 1.3, text: '', confirmed: true }], sweep: null },
      }),
    );
    const { user } = await open();
    await user.click(screen.getByRole('button', { name: 'Add a reading' }));
    await user.click(screen.getByRole('button', { name: 'Move “What you read in it” up' }));
    await settled();
    expect(there().wanted.map(({ kind }) => kind)).toEqual(['reading', 'special point']);
    expect(there().reference.findings[1]).toMatchObject({ id: 'w1', value: 1.3, confirmed: true });
    await user.click(screen.getByRole('button', { name: 'Remove “Onset of cycles”' }));
    await settled();
    expect(there().wanted).toHaveLength(1);
    expect(there().reference.findings.map(({ value }) => value)).toEqual([null]);
  });

  it('takes the reference from a run of the engine, to be confirmed', async () => {
    const { there } = serve();
    const { user } = await open();
    const references = within(screen.getByRole('list', { name: 'Reference findings' }));
    expect(references.getByRole('checkbox', { name: 'Confirmed' })).toBeDisabled();
    await user.click(screen.getByRole('button', { name: 'Compute the reference' }));
    const value = references.getByRole('textbox', { name: 'Reference for Onset of cycles' });
    await waitFor(() => expect(value).not.toHaveValue(''), { timeout: 20_000 });
    await user.click(references.getByRole('checkbox', { name: 'Confirmed' }));
    await settled();
    const [finding] = there().reference.findings;
    expect(finding?.confirmed).toBe(true);
    const hopfs = there().reference.sweep?.split.points.filter(({ kind }) => kind === 'Hopf');
    expect(hopfs?.map(({ parameter }) => parameter)).toContain(finding?.value);
    // A value that is typed over it has to be confirmed anew.
    await user.clear(value);
    await user.type(value, '1.5{Enter}');
    await settled();
    expect(there().reference.findings[0]).toMatchObject({ value: 1.5, confirmed: false });
  });

  it('keeps the clock where it was put when the zone changes', async () => {
    const { there } = serve();
    const { user } = await open();
    fireEvent.change(screen.getByLabelText('Date and time'), { target: { value: '2031-01-15T17:00' } });
    await settled();
    expect(there().dueAt).toBe('2031-01-15T16:00:00.000Z');
    await user.selectOptions(screen.getByRole('combobox', { name: 'Time zone' }), 'America/New_York');
    await settled();
    expect(there()).toMatchObject({ dueAt: '2031-01-15T22:00:00.000Z', timeZone: 'America/New_York' });
    expect(screen.getByLabelText('Date and time')).toHaveValue('2031-01-15T17:00');
  });

  it('offers those who do sweeps, found by name, all or none', async () => {
    const { there } = serve();
    const { user } = await open();
    await screen.findByRole('checkbox', { name: 'Sanna' });
    expect(screen.queryByRole('checkbox', { name: 'Ada' })).toBeNull();
    await user.type(screen.getByRole('textbox', { name: 'Search people' }), 'ru');
    expect(screen.queryByRole('checkbox', { name: 'Sanna' })).toBeNull();
    await user.click(screen.getByRole('button', { name: 'All' }));
    await settled();
    expect(there().people.map(({ id }) => id)).toEqual(['sanna', 'rui']);
  });

  it('tells of what another saved, and writes over it only when told to', async () => {
    const { there, meanwhile } = serve();
    const { user } = await open();
    meanwhile({ brief: 'Theirs.' });
    await user.type(screen.getByRole('textbox', { name: 'Brief' }), 'Mine.');
    await user.click(
      await screen.findByRole('button', { name: 'Save mine over theirs' }, { timeout: 5_000 }),
    );
    await settled();
    expect(there().brief).toBe('Mine.');
  });

  it('says what cannot be saved, and why', async () => {
    const { asked } = serve();
    const { user } = await open();
    const title = screen.getByRole('textbox', { name: 'Title' });
    await user.clear(title);
    await user.type(title, '{Enter}');
    expect(screen.getByText('A title is needed.')).toBeInTheDocument();
    expect(patches(asked)).toHaveLength(0);
  });

  it('opens when nothing stands in the way, and then keeps the work as it is', async () => {
    serve(
      assignedBody({
        obstacles: [],
        people: [{ id: 'sanna', name: 'Sanna', state: 'running', member: true }],
      }),
    );
    const { user } = await open();
    await user.click(screen.getByRole('button', { name: 'Open' }));
    await screen.findByRole('button', { name: 'Close' });
    expect(screen.getByRole('combobox', { name: 'Parameter' })).toBeDisabled();
    expect(screen.getByRole('button', { name: 'Add a number' })).toBeDisabled();
    expect(await screen.findByRole('checkbox', { name: 'Sanna' })).toBeDisabled();
  });

  it('lists what stands in the way of opening', async () => {
    serve();
    await open();
    expect(screen.getByRole('button', { name: 'Open' })).toBeDisabled();
    expect(screen.getByText('It has no due date.')).toBeInTheDocument();
  });
});
