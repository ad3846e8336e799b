import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { act, screen, waitFor } from '@testing-library/react';
import { createMemoryRouter, Link, Outlet, RouterProvider } from 'react-router-dom';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';

import { BenchDialogs } from '@/features/workbench/dialogs/bench-dialogs';
import { keepDraft, readDraft } from '@/features/workbench/drafts/draft-storage';
import { LeaveGuard } from '@/features/workbench/drafts/leave-guard';
import { useKeepDraft } from '@/features/workbench/drafts/use-keep-draft';
import { useCommandContext } from '@/features/workbench/commands/use-command-context';
import { useBenchUi } from '@/features/workbench/layout/bench-ui';
import { handedOver, settleHandOver } from '@/features/workbench/state/hand-over';
import type { Origin } from '@/features/workbench/state/store';

import { renderOnBench, twoSexes } from './support';

const ORIGIN: Origin = {
  kind: 'preset',
  id: 'p1',
  version: 7,
  rights: ['view', 'save', 'restore', 'duplicate', 'change visibility', 'share by link'],
  labName: 'Fen lab',
  starter: false,
};
const SESSION = {
  user: { id: 'u1', name: 'Rui', email: 'rui@demo.invalid', demo: true, memberships: [] },
  csrfToken: 'token',
  demo: true,
};

interface Asked {
  readonly method: string;
  readonly path: string;
  readonly body: Record<string, unknown> | null;
}
type Answer = (asked: Asked) => { readonly status: number; readonly body: unknown } | undefined;

/** A server of a few answers; every question is kept. */
function answerWith(answer: Answer): Asked[] {
  const asked: Asked[] = [];
  vi.stubGlobal('fetch', async (path: string, init: RequestInit = {}) => {
    const text = typeof init.body === 'string' ? init.body : 'null';
    const question: Asked = { method: init.method ?? 'GET', path, body: JSON.parse(text) as Asked['body'] };
    if (path === '/api/session') return Response.json(SESSION);
    asked.push(question);
    const given = answer(question);
    if (given === undefined) return Response.json({}, { status: 404 });
    return given.status === 204
      ? new Response(null, { status: 204 })
      : Response.json(given.body, { status: given.status });
  });
  return asked;
}

function presetBody(version: number, document = twoSexes(), id = 'p1') {
  return {
    preset: {
      id,
      title: document.title,
      summary: '',
      tags: [],
      starter: false,
      visibility: 'private',
      owner: { id: 'u1', name: 'Rui' },
      lab: null,
      version,
      changedAt: '2030-05-01T10:00:00.000Z',
      createdAt: '2030-05-01T10:00:00.000Z',
      populations: [],
    },
    version: {
      number: version,
      author: 'Rui',
      savedAt: '2030-05-01T10:00:00.000Z',
      note: '',
      restoredFrom: null,
    },
    document,
    rights: ORIGIN.kind === 'preset' ? ORIGIN.rights : [],
  };
}

const CONFLICT = {
  error: {
    code: 'conflict',
    message: 'Version 8 was saved in between.',
    head: { number: 8, author: 'Ada', savedAt: '2030-05-01T11:00:00.000Z', note: 'New counts' },
  },
};

function Inner() {
  const context = useCommandContext();
  useKeepDraft('u1.p1');
  return (
    <>
      <BenchDialogs context={context} />
      <LeaveGuard />
      <Link to="/elsewhere">Elsewhere</Link>
    </>
  );
}

function renderBench(origin: Origin = ORIGIN) {
  const router = createMemoryRouter(
    [
      { element: <Outlet />, children: [{ path: '/presets/:id', element: <Inner /> }] },
      { path: '/elsewhere', element: <p>Another page</p> },
    ],
    { initialEntries: ['/presets/p1'] },
  );
  const queries = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const bench = renderOnBench(
    <QueryClientProvider client={queries}>
      <RouterProvider router={router} />
    </QueryClientProvider>,
    twoSexes(),
    origin,
  );
  const turn = (spread: number) =>
    act(() => bench.store.getState().edit('Turn the spread', (document) => ({ ...document, spread })));
  const open = (dialog: 'save' | 'share' | 'history') => act(() => useBenchUi.getState().set({ dialog }));
  return { ...bench, router, turn, open };
}

beforeEach(() => {
  localStorage.clear();
  useBenchUi.setState({ dialog: null, notice: null });
});
afterEach(() => vi.unstubAllGlobals());

describe('saving', () => {
  it('makes a new version on top of the one the work began from', async () => {
    const asked = answerWith(() => ({ status: 201, body: presetBody(8) }));
    const { user, store, turn, open } = renderBench();
    turn(0.5);
    open('save');
    await user.type(screen.getByRole('textbox', { name: 'Note' }), 'Half the spread');
    await user.click(screen.getByRole('button', { name: 'Save' }));
    await waitFor(() => expect(useBenchUi.getState().notice).toBe('Saved as version 8.'));
    expect(asked[0]).toMatchObject({
      method: 'POST',
      path: '/api/presets/p1/versions',
      body: { note: 'Half the spread', baseVersion: 7, document: { spread: 0.5 } },
    });
    expect(store.getState().saved).toBe(store.getState().document);
    expect(store.getState().origin).toMatchObject({ version: 8 });
  });

  it('tells who saved before, shows the differences, and saves on top only when asked to', async () => {
    const theirs = { ...twoSexes(), horizon: 400 };
    const asked = answerWith(({ method, path, body }) => {
      if (method === 'GET' && path.endsWith('/versions/8'))
        return { status: 200, body: presetBody(8, theirs) };
      return body?.['baseVersion'] === 8
        ? { status: 201, body: presetBody(9) }
        : { status: 409, body: CONFLICT };
    });
    const { user, store, turn, open } = renderBench();
    turn(0.5);
    open('save');
    await user.click(screen.getByRole('button', { name: 'Save' }));
    expect(await screen.findByText(/Ada saved version 8/)).toHaveTextContent('New counts');
    expect(store.getState().document.spread).toBe(0.5);
    await user.click(screen.getByRole('button', { name: 'See the differences' }));
    expect(await screen.findByRole('row', { name: 'Length of a trajectory 400 100' })).toBeInTheDocument();
    await user.click(screen.getByRole('button', { name: 'Save mine as version 9' }));
    await waitFor(() => expect(store.getState().origin).toMatchObject({ version: 9 }));
    expect(asked.at(-1)?.body).toMatchObject({ baseVersion: 8, document: { spread: 0.5 } });
  });

  it('keeps both by a copy of one’s own', async () => {
    const asked = answerWith(({ path }) =>
      path === '/api/presets'
        ? { status: 201, body: presetBody(1, twoSexes(), 'p2') }
        : { status: 409, body: CONFLICT },
    );
    const { user, router, turn, open } = renderBench();
    turn(0.5);
    open('save');
    await user.click(screen.getByRole('button', { name: 'Save' }));
    await user.click(await screen.findByRole('button', { name: /Keep both/ }));
    await waitFor(() => expect(router.state.location.pathname).toBe('/presets/p2'));
    expect(asked.at(-1)?.body).toMatchObject({
      visibility: 'private',
      document: { title: 'Voles and weasels, my copy', spread: 0.5 },
    });
  });

  it('takes the history along when the first save moves the page to its own address', async () => {
    answerWith(() => ({ status: 201, body: presetBody(1, twoSexes(), 'p9') }));
    const { user, store, router, turn, open } = renderBench({ kind: 'new' });
    turn(0.5);
    open('save');
    await user.click(screen.getByRole('button', { name: 'Save' }));
    await waitFor(() => expect(router.state.location.pathname).toBe('/presets/p9'));
    expect(handedOver('p9')).toBe(store);
    expect(handedOver('p1')).toBeNull();
    expect(store.getState().origin).toMatchObject({ kind: 'preset', id: 'p9', version: 1 });
    act(() => store.getState().undo());
    expect(store.getState().document.spread).toBe(1);
    settleHandOver();
    expect(handedOver('p9')).toBeNull();
  });

  it('says what the server refuses and keeps the work', async () => {
    answerWith(() => ({
      status: 413,
      body: { error: { code: 'too-large', message: 'The document is too large.' } },
    }));
    const { user, store, turn, open } = renderBench();
    turn(0.5);
    open('save');
    await user.click(screen.getByRole('button', { name: 'Save' }));
    expect(await screen.findByText(/The document is too large/)).toBeInTheDocument();
    expect(store.getState().document).not.toBe(store.getState().saved);
  });
});

describe('leaving and drafts', () => {
  it('asks before unsaved work is left, and keeps it as a draft', async () => {
    answerWith(() => undefined);
    const { user, router, turn } = renderBench();
    turn(0.25);
    await user.click(screen.getByRole('link', { name: 'Elsewhere' }));
    expect(router.state.location.pathname).toBe('/presets/p1');
    await user.click(screen.getByRole('button', { name: 'Stay' }));
    await user.click(screen.getByRole('link', { name: 'Elsewhere' }));
    await user.click(screen.getByRole('button', { name: 'Keep draft and leave' }));
    expect(await screen.findByText('Another page')).toBeInTheDocument();
    expect(readDraft('u1.p1')).toMatchObject({ baseVersion: 7, document: { spread: 0.25 } });
  });

  it('lets saved work go without a question', async () => {
    answerWith(() => undefined);
    const { user } = renderBench();
    await user.click(screen.getByRole('link', { name: 'Elsewhere' }));
    expect(await screen.findByText('Another page')).toBeInTheDocument();
  });

  it('forgets what is discarded', async () => {
    answerWith(() => undefined);
    const { user, turn } = renderBench();
    turn(0.25);
    await waitFor(() => expect(readDraft('u1.p1')).not.toBeNull());
    await user.click(screen.getByRole('link', { name: 'Elsewhere' }));
    await user.click(screen.getByRole('button', { name: 'Discard changes' }));
    expect(await screen.findByText('Another page')).toBeInTheDocument();
    expect(readDraft('u1.p1')).toBeNull();
  });

  it('reads no draft that is broken', () => {
    expect(keepDraft('k', { document: twoSexes(), baseVersion: 2, keptAt: '' })).toBe(true);
    expect(readDraft('k')?.baseVersion).toBe(2);
    localStorage.setItem('moiety.draft.k', '{"document":{"format":"other"}}');
    expect(readDraft('k')).toBeNull();
    localStorage.setItem('moiety.draft.k', '{');
    expect(readDraft('k')).toBeNull();
  });
});

describe('history and links', () => {
  const version = (number: number) => ({
    number,
    author: 'Ada',
    savedAt: '2030-05-01T10:00:00.000Z',
    note: `Note ${number}`,
    restoredFrom: null,
  });

  it('opens an earlier version as an edit that can be undone, and restores as a new version', async () => {
    const old = { ...twoSexes(), spread: 0 };
    const asked = answerWith(({ path }) => {
      if (path.includes('/versions?'))
        return { status: 200, body: { items: [version(7), version(6)], total: 2, page: 1, pageSize: 20 } };
      if (path.endsWith('/restore')) return { status: 201, body: presetBody(8, old) };
      return { status: 200, body: presetBody(6, old) };
    });
    const { user, store, model, open } = renderBench();
    open('history');
    await user.click(await screen.findByRole('button', { name: 'Open version 6' }));
    await waitFor(() => expect(model().spread).toBe(0));
    act(() => store.getState().undo());
    expect(model().spread).toBe(1);
    open('history');
    await user.click(await screen.findByRole('button', { name: 'Restore version 6' }));
    await waitFor(() => expect(store.getState().origin).toMatchObject({ version: 8 }));
    expect(asked.findLast((one) => one.method === 'POST')).toMatchObject({
      path: '/api/presets/p1/versions/6/restore',
      body: { baseVersion: 7 },
    });
  });

  it('creates a link, shows its address once and revokes it', async () => {
    const link = {
      id: 'l1',
      label: 'Reviewers',
      createdAt: '2030-05-01T10:00:00.000Z',
      revokedAt: null,
      opened: 0,
      lastOpenedAt: null,
      expiresAt: null,
      access: 'copy',
    };
    const asked = answerWith(({ method, path }) => {
      if (method === 'DELETE') return { status: 204, body: null };
      if (method === 'POST')
        return { status: 201, body: { link, token: 'secret-token', url: 'http://localhost/shared/x' } };
      return path.endsWith('/links')
        ? { status: 200, body: { links: [link] } }
        : { status: 200, body: presetBody(7) };
    });
    const { user, open } = renderBench();
    open('share');
    await user.type(await screen.findByRole('textbox', { name: 'Who is it for?' }), 'Reviewers');
    await user.click(screen.getByRole('button', { name: 'Create link' }));
    expect(await screen.findByRole('textbox', { name: 'Address of the new link' })).toHaveValue(
      'http://localhost:3000/s/secret-token',
    );
    await user.click(screen.getByRole('button', { name: 'Revoke Reviewers' }));
    await waitFor(() =>
      expect(asked.some((one) => one.method === 'DELETE' && one.path === '/api/presets/p1/links/l1')).toBe(
        true,
      ),
    );
  });
});
