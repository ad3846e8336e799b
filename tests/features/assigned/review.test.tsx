import { screen, waitFor, within } from '@testing-library/react';
import { afterEach, describe, expect, it, vi } from 'vitest';

import type { PeopleTable, Review, ReviewedHandIn } from '@/contract/assigned-sweeps';
import HandInPage from '@/features/assigned/review/hand-in-page';
import ReviewPage from '@/features/assigned/review/review-page';
import { createLocalEngine } from '@/workers/local-engine';

import { answerWith, assignedBody, handIn, renderPage } from './support';

vi.mock('@/workers/client', () => ({ createEngineClient: () => createLocalEngine() }));
afterEach(() => void vi.unstubAllGlobals());

const RECEIPT = { number: 1, handedInAt: '2026-11-30T13:00:00.000Z', late: false, code: '0123456789ab' };

function table(judgement: 'agrees' | 'differs' = 'differs'): PeopleTable {
  const person = (id: string, state: PeopleTable['rows'][number]['state'], sent: boolean) => ({
    person: { id, name: id },
    member: true,
    state,
    handIn: sent ? { id: `h-${id}`, ...RECEIPT } : null,
    runs: 2,
    lastActiveAt: null,
    cells: {
      w1: {
        value: sent ? 1.4 : null,
        text: '',
        proposal: { judgement: sent ? judgement : null, reason: `Because of ${id}.` },
        judgement: null,
      },
    },
  });
  return {
    wanted: assignedBody().wanted,
    rows: [person('Rui', 'untouched', false), person('Sanna', 'sent', true), person('Colm', 'agreed', true)],
  };
}

describe('people by findings', () => {
  const open = async () => {
    let tolerance = 0.01;
    const asked = answerWith(({ method, path, body }) => {
      if (path === '/api/assigned/a1/send-back') return { body: table() };
      if (path === '/api/assigned/a1/table') return { body: table(tolerance > 0.02 ? 'agrees' : 'differs') };
      if (method === 'PATCH') {
        const wanted = body.wanted as { tolerance: { amount: number } }[];
        tolerance = wanted[0]?.tolerance.amount ?? 0;
        return { body: { ...assignedBody({ state: 'open', revision: 2 }), wanted } };
      }
      return path === '/api/assigned/a1' ? { body: assignedBody({ state: 'open' }) } : undefined;
    });
    const page = renderPage(ReviewPage, '/assigned/:id/review', '/assigned/a1/review');
    await screen.findByRole('table');
    return { ...page, asked };
  };

  it('show state, value and what is proposed with its reason, to screen readers too', async () => {
    await open();
    const row = screen.getByRole('row', { name: /Sanna/ });
    expect(row).toHaveTextContent(/sent.*1\.40000.*proposed: differs.*Because of Sanna\./);
    expect(screen.getByRole('row', { name: /Rui/ })).toHaveTextContent(/not begun|untouched/);
    expect(screen.getByRole('link', { name: 'Download as CSV' })).toHaveAttribute(
      'href',
      '/api/assigned/a1/table.csv',
    );
  });

  it('are filtered by state', async () => {
    const { user } = await open();
    await user.selectOptions(screen.getByRole('combobox', { name: 'Shown' }), 'sent');
    expect(screen.getAllByRole('row')).toHaveLength(2);
    await user.selectOptions(screen.getByRole('combobox', { name: 'Shown' }), 'sent back');
    expect(screen.getByText('Nobody is in this state.')).toBeInTheDocument();
  });

  it('are sent back, all or some, with a note', async () => {
    const { user, asked } = await open();
    expect(screen.getByRole('checkbox', { name: 'Choose Rui' })).toBeDisabled();
    await user.click(screen.getByRole('checkbox', { name: /^Choose everyone/ }));
    await user.click(screen.getByRole('checkbox', { name: 'Choose Colm' }));
    await user.click(screen.getByRole('button', { name: 'Send 1 back…' }));
    const dialog = within(screen.getByRole('dialog'));
    await user.click(dialog.getByRole('button', { name: 'Send back' }));
    expect(dialog.getByText('Say what is asked for.')).toBeInTheDocument();
    await user.type(dialog.getByRole('textbox', { name: 'What is asked of them' }), 'Again, please.');
    await user.click(dialog.getByRole('button', { name: 'Send back' }));
    await screen.findByText('Sent back to 1 person.');
    expect(asked.find(({ path }) => path.endsWith('/send-back'))?.body).toEqual({
      people: ['Sanna'],
      note: 'Again, please.',
    });
  });

  it('follow a change of tolerance', async () => {
    const { user, asked } = await open();
    const field = screen.getByRole('textbox', { name: 'Tolerance of Onset of cycles' });
    await user.clear(field);
    await user.type(field, '5{Enter}');
    await waitFor(() =>
      expect(screen.getByRole('row', { name: /Sanna/ })).toHaveTextContent('proposed: agrees'),
    );
    expect(asked.find(({ method }) => method === 'PATCH')?.body).toMatchObject({
      baseRevision: 1,
      wanted: [{ id: 'w1', tolerance: { kind: 'relative', amount: 0.05 } }],
    });
  });
});

describe('one hand-in', () => {
  const open = async (initial: ReviewedHandIn = handIn()) => {
    let there = initial;
    const puts: Record<string, unknown>[] = [];
    answerWith(({ method, path, body }) => {
      if (path === '/api/assigned/a1/table') return { body: table() };
      if (path === '/api/hand-ins/h1' && method === 'GET') return { body: there };
      if (path !== '/api/hand-ins/h1/review') return undefined;
      puts.push(body);
      const { baseRevision, ...review } = body as unknown as Omit<Review, 'revision'> & {
        baseRevision: number;
      };
      there = {
        ...there,
        review: { ...review, revision: baseRevision + 1, by: 'Ada', at: '2026-12-01T10:00:00.000Z' },
      };
      return { body: there };
    });
    const page = renderPage(HandInPage, '/hand-ins/:id', '/hand-ins/h1');
    await screen.findByRole('heading', { name: 'Sanna, hand-in 1' });
    return { ...page, puts };
  };

  it('stands beside the reference, with what was changed and their note', async () => {
    await open();
    expect(screen.getByRole('region', { name: 'Findings' })).toHaveTextContent(
      /theirs 1\.330000\s*reference 1\.324771\s*proposed agrees: 1\.33 against/,
    );
    expect(screen.getByText('r is locked no more.')).toBeInTheDocument();
    expect(screen.getByText('Done twice.')).toBeInTheDocument();
  });

  it('is judged by taking over what is proposed, or otherwise, and kept as a draft', async () => {
    const { user, puts } = await open();
    const decision = within(screen.getByRole('group', { name: 'Decision on Onset of cycles' }));
    await user.click(screen.getByRole('button', { name: 'Take over what is proposed' }));
    expect(decision.getByRole('button', { name: 'agrees' })).toHaveAttribute('aria-pressed', 'true');
    await user.click(decision.getByRole('button', { name: 'differs' }));
    await waitFor(() => expect(puts).toHaveLength(1), { timeout: 5_000 });
    expect(puts[0]).toMatchObject({ baseRevision: 0, judgements: { w1: 'differs' }, outcome: null });
    await user.click(decision.getByRole('button', { name: 'differs' }));
    expect(decision.getByRole('button', { name: 'differs' })).toHaveAttribute('aria-pressed', 'false');
  });

  it('takes remarks on findings, and at a special point without a pointer', async () => {
    const { user, puts } = await open();
    await user.click(screen.getByRole('button', { name: 'Remark on Onset of cycles' }));
    await user.type(screen.getByRole('textbox', { name: 'Remark on Onset of cycles' }), 'Look closer.');
    await user.click(screen.getByRole('button', { name: 'Add the remark' }));
    const points = screen.getByRole('combobox', { name: 'Pin a remark at a special point' });
    await user.selectOptions(points, within(points).getByRole('option', { name: /^theirs: Hopf/ }));
    await user.type(screen.getByRole('textbox', { name: /^Remark at K = 1\.3248, x = 0\.4000/ }), 'Here.');
    await user.click(screen.getByRole('button', { name: 'Add the remark' }));
    await user.click(screen.getByRole('button', { name: 'Give back: agreed' }));
    await screen.findByText(/Given back as/);
    expect(puts.at(-1)).toMatchObject({
      outcome: 'agreed',
      remarks: [
        { finding: 'w1', place: null, text: 'Look closer.' },
        { finding: null, place: { of: 'x', parameter: 1.3247706, value: 0.4 }, text: 'Here.' },
      ],
    });
  });

  it('once given back, changes only when it is given back again', async () => {
    const review: Review = {
      revision: 4,
      judgements: {},
      remarks: [],
      outcome: 'agreed',
      note: 'Well found.',
      by: 'Ada',
      at: '2026-12-01T10:00:00.000Z',
    };
    const { user, puts } = await open(handIn({ review }));
    await user.type(screen.getByRole('textbox', { name: 'Note to Sanna' }), ' But look again.');
    await new Promise((resolve) => setTimeout(resolve, 1_300));
    expect(puts).toHaveLength(0);
    await user.click(screen.getByRole('button', { name: 'Send back to be done again' }));
    await waitFor(() => expect(puts).toHaveLength(1));
    expect(puts[0]).toMatchObject({
      baseRevision: 4,
      outcome: 'sent back',
      note: 'Well found. But look again.',
    });
  });

  it('is replayed by the engine from what was frozen', async () => {
    const { user } = await open();
    await user.click(screen.getByRole('button', { name: 'Replay the sweep' }));
    const words = await screen.findByText(
      /of 1 special point|The special point comes out again/,
      {},
      { timeout: 20_000 },
    );
    expect(words.textContent).toMatch(/largest relative difference/);
  });

  it('leads to a newer one, and to the people beside', async () => {
    const newer = { ...RECEIPT, id: 'h2', number: 2, outcome: null };
    await open(handIn({ person: { id: 'Sanna', name: 'Sanna' }, all: [newer, ...handIn().all] }));
    expect(screen.getByRole('link', { name: 'hand-in 2' })).toHaveAttribute('href', '/hand-ins/h2');
    expect(await screen.findByRole('link', { name: 'Next: Colm' })).toHaveAttribute(
      'href',
      '/hand-ins/h-Colm',
    );
  });
});
