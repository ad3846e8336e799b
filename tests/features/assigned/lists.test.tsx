import { screen, waitFor, within } from '@testing-library/react';
import { afterEach, describe, expect, it, vi } from 'vitest';

import type { AssignedPage, AssignedSummary } from '@/contract/assigned-sweeps';
import { AssignedToMe } from '@/features/assigned/list/assigned-to-me';
import { SetSweepDialog } from '@/features/assigned/list/set-sweep-dialog';
import SweepsPage from '@/features/assigned/list/sweeps-page';
import { ownTimeZone } from '@/features/assigned/set/zoned-time';

import { answerWith, assignedBody, renderPage } from './support';

afterEach(() => void vi.unstubAllGlobals());

function sweep(change: Partial<AssignedSummary> = {}): AssignedSummary {
  return {
    id: 'a1',
    title: 'Onset of cycles',
    lab: { id: 'lab', name: 'Fen lab' },
    state: 'open',
    dueAt: '2031-01-15T16:00:00.000Z',
    timeZone: 'Europe/Berlin',
    mine: null,
    counts: { untouched: 1, running: 0, sent: 2, agreed: 0, differs: 0, 'sent back': 0 },
    ...change,
  };
}
const pageOf = (items: AssignedSummary[], total = items.length): AssignedPage => ({
  items,
  total,
  page: 1,
  pageSize: 20,
});

describe('the assigned sweeps of a lab', () => {
  it('show state, due date in their zone and how many stand where', async () => {
    answerWith(() => ({
      body: pageOf([sweep(), sweep({ id: 'a2', title: 'A draft', state: 'draft', dueAt: null })]),
    }));
    renderPage(SweepsPage, '/lab/sweeps', '/lab/sweeps?in=lab');
    const [first, second] = await screen
      .findAllByRole('listitem')
      .then((all) => all.filter((one) => within(one).queryAllByRole('link').length > 0));
    expect(first).toHaveTextContent(
      /open.*due Wed, 15 Jan 2031, 17:00 (CET|GMT\+1), in .*1\s*untouched.*2\s*sent/,
    );
    expect(within(first as HTMLElement).getByRole('link', { name: 'Onset of cycles' })).toHaveAttribute(
      'href',
      '/assigned/a1/set',
    );
    expect(
      within(first as HTMLElement).getByRole('link', { name: 'Review Onset of cycles' }),
    ).toHaveAttribute('href', '/assigned/a1/review');
    expect(second).toHaveTextContent(/A draft.*draft.*no due date yet/);
    expect(within(second as HTMLElement).queryByRole('link', { name: /^Review/ })).toBeNull();
  });

  it('are asked for by state and page', async () => {
    const asked = answerWith(() => ({ body: pageOf([sweep()], 45) }));
    const { user } = renderPage(SweepsPage, '/lab/sweeps', '/lab/sweeps?in=lab');
    await user.click(await screen.findByRole('button', { name: 'Older' }));
    await waitFor(() => expect(asked.at(-1)?.path).toBe('/api/labs/lab/assigned?page=2'));
    await user.selectOptions(screen.getByRole('combobox', { name: 'Shown' }), 'closed');
    await waitFor(() => expect(asked.at(-1)?.path).toBe('/api/labs/lab/assigned?page=1&state=closed'));
  });
});

describe('the desk', () => {
  it('shows what is set for oneself, leading to the task, and nothing where nothing is', async () => {
    answerWith(({ path }) =>
      path === '/api/assigned'
        ? { body: pageOf([sweep({ counts: null, mine: 'sent back' })]) }
        : { body: pageOf([]) },
    );
    renderPage(AssignedToMe, '/', '/');
    const shelf = within(await screen.findByRole('region', { name: 'Assigned to you' }));
    expect(shelf.getByRole('link', { name: 'Onset of cycles' })).toHaveAttribute('href', '/assigned/a1');
    expect(shelf.getByRole('listitem')).toHaveTextContent(/sent back.*Fen lab/);
    expect(screen.queryByRole('region', { name: /^Open sweeps/ })).toBeNull();
  });
});

describe('setting a sweep from a preset', () => {
  const Dialog = () => (
    <SetSweepDialog preset={{ id: 'p1', title: 'Midges', version: 3 }} onClose={() => undefined} />
  );

  it('makes a draft of that version, on the clocks of whoever sets it', async () => {
    const asked = answerWith(({ method, body }) => ({
      status: method === 'POST' ? 201 : 200,
      body: { ...assignedBody({ timeZone: 'Pacific/Apia' }), ...(method === 'PATCH' ? body : {}) },
    }));
    const { user, router } = renderPage(Dialog, '/presets', '/presets');
    await screen.findByText('Fen lab');
    await user.click(screen.getByRole('button', { name: 'Make the draft' }));
    await waitFor(() => expect(router.state.location.pathname).toBe('/assigned/a1/set'));
    expect(asked.map(({ method, path, body }) => [method, path, body])).toEqual([
      ['POST', '/api/labs/lab/assigned', { presetId: 'p1', version: 3 }],
      ['PATCH', '/api/assigned/a1', { baseRevision: 1, timeZone: ownTimeZone() }],
    ]);
  });

  it('says why it could not', async () => {
    answerWith(() => ({
      status: 403,
      body: { error: { code: 'not-allowed', message: 'Only supervisors set sweeps.' } },
    }));
    const { user } = renderPage(Dialog, '/presets', '/presets');
    await screen.findByText('Fen lab');
    await user.click(screen.getByRole('button', { name: 'Make the draft' }));
    expect(await screen.findByText('Only supervisors set sweeps.')).toBeInTheDocument();
  });
});
