import { QueryTypes, type Transaction } from 'sequelize';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

import type { PresetBody, PresetChoices, PresetPage, VersionPage } from '@/contract/presets';
import { STARTER_PRESETS } from '@/presets';

import { createMigrator } from '../../server/migrations';
import { DEMO_LAB, seedDemo } from '../../server/seeds/demo';
import { seedStarters } from '../../server/seeds/starters';
import { sampleDocument, startTestServer, Visitor, type TestServer } from '../support/test-server';

let server: TestServer;
let researcher: Visitor;
beforeAll(async () => {
  server = await startTestServer();
  researcher = await server.person('researcher');
});
afterAll(() => server.close());

const make = async (title: string, more: object = {}) =>
  (await researcher.post('/presets', { document: sampleDocument(title), ...more })).body as PresetBody;

describe('versions', () => {
  it('are numbered, kept whole, and say who saved them', async () => {
    const first = await make('Numbered');
    const saved = await researcher.post(`/presets/${first.preset.id}/versions`, {
      document: { ...sampleDocument('Numbered'), spread: 0.5 },
      note: 'half the spread',
      baseVersion: 1,
    });
    expect(saved.status).toBe(201);
    expect((saved.body as PresetBody).version).toMatchObject({
      number: 2,
      author: 'Rui Maddock',
      note: 'half the spread',
    });
    const old = (await researcher.get(`/presets/${first.preset.id}/versions/1`)).body as PresetBody;
    expect(old.document.spread).toBe(1);
    const list = (await researcher.get(`/presets/${first.preset.id}/versions`)).body as VersionPage;
    expect(list.items.map((one) => one.number)).toEqual([2, 1]);
  });

  it('tells the second of two people who save over each other, and loses neither', async () => {
    const { preset } = await make('Shared work', { visibility: 'lab', labId: DEMO_LAB.id });
    const supervisor = await server.person('supervisor');
    const save = (who: Visitor, note: string) =>
      who.post(`/presets/${preset.id}/versions`, { document: sampleDocument(note), note, baseVersion: 1 });
    expect((await save(supervisor, 'hers')).status).toBe(201);
    const second = await save(researcher, 'his');
    expect(second.status).toBe(409);
    expect((second.body as { error: { head: object } }).error.head).toMatchObject({
      number: 2,
      author: 'Ada Fennimore',
      note: 'hers',
    });
    const head = (await researcher.get(`/presets/${preset.id}`)).body as PresetBody;
    expect(head.version.note).toBe('hers');
  });

  it('never change in the database', async () => {
    const { preset } = await make('Fixed');
    const { sequelize } = server.database;
    await expect(
      sequelize.query("UPDATE preset_versions SET note = 'x' WHERE presetId = ?", {
        replacements: [preset.id],
      }),
    ).rejects.toMatchObject({ parent: { message: expect.stringContaining('never changes') as unknown } });
    await expect(
      sequelize.query('DELETE FROM preset_versions WHERE presetId = ?', { replacements: [preset.id] }),
    ).rejects.toMatchObject({ parent: { message: expect.stringContaining('never deleted') as unknown } });
  });

  it('are restored as a new version', async () => {
    const { preset } = await make('Restored');
    await researcher.post(`/presets/${preset.id}/versions`, {
      document: { ...sampleDocument('Restored'), spread: 2 },
      baseVersion: 1,
    });
    const restored = await researcher.post(`/presets/${preset.id}/versions/1/restore`, { baseVersion: 2 });
    expect((restored.body as PresetBody).version).toMatchObject({ number: 3, restoredFrom: 1 });
    expect((restored.body as PresetBody).document.spread).toBe(1);
  });

  it('stay correct with 50 saves in flight', async () => {
    const { preset } = await make('Busy');
    const began = Date.now();
    const others = Array.from({ length: 25 }, (_, k) =>
      researcher.post('/presets', { document: sampleDocument(`In flight ${k}`) }),
    );
    const saves = Array.from({ length: 25 }, () =>
      researcher.post(`/presets/${preset.id}/versions`, { document: sampleDocument('Busy'), baseVersion: 1 }),
    );
    const statuses = (await Promise.all([...others, ...saves])).map((one) => one.status);
    expect(statuses.slice(0, 25)).toEqual(Array(25).fill(201));
    expect(statuses.slice(25).sort()).toEqual([201, ...Array<number>(24).fill(409)]);
    expect(Date.now() - began).toBeLessThan(20_000);
    expect(((await researcher.get(`/presets/${preset.id}`)).body as PresetBody).version.number).toBe(2);
  });
});

describe('the library', () => {
  it('searches words by their beginnings, in titles, summaries and tags', async () => {
    await make('Salamanders of the quarry');
    const find = async (search: string) =>
      ((await researcher.get(`/presets?search=${search}`)).body as PresetPage).items.map((one) => one.title);
    expect(await find('salaman')).toEqual(['Salamanders of the quarry']);
    expect(await find('quarry%20salamanders')).toEqual(['Salamanders of the quarry']);
    expect(await find('allee%20effect')).toContain('Sturgeon that fail when sparse, under harvest');
    expect(await find('no-such-word')).toEqual([]);
  });

  it('filters by kind, owner and tag, sorts, and pages on the server', async () => {
    const page = async (query: string) => (await researcher.get(`/presets?${query}`)).body as PresetPage;
    const starters = await page('kind=starter&pageSize=100&sort=title');
    expect(starters.total).toBe(STARTER_PRESETS.length);
    expect(starters.items.map((one) => one.title)).toEqual(
      [...starters.items.map((one) => one.title)].sort((a, b) =>
        a.localeCompare(b, 'en', { sensitivity: 'base' }),
      ),
    );
    expect(starters.items.every((one) => one.starter)).toBe(true);
    const first = await page('pageSize=3&page=1&sort=title');
    const second = await page('pageSize=3&page=2&sort=title');
    expect(first.items).toHaveLength(3);
    expect(second.items.map((one) => one.id)).not.toEqual(first.items.map((one) => one.id));
    expect((await page('tag=fold')).items.every((one) => one.tags.includes('fold'))).toBe(true);
    expect((await page('owner=me')).items.every((one) => one.owner?.name === 'Rui Maddock')).toBe(true);
  });

  it('offers tags with their counts and other owners, of what one may see alone', async () => {
    const tagged = { ...sampleDocument('Rare'), tags: ['a tag of nobody else', 'pond'] };
    await researcher.post('/presets', { document: tagged });
    const student = await server.person('student');
    const choices = async (who: Visitor) => (await who.get('/presets/choices')).body as PresetChoices;
    const mine = await choices(researcher);
    expect(mine.tags.find(({ tag }) => tag === 'a tag of nobody else')?.count).toBe(1);
    const pond = ((await researcher.get('/presets?tag=pond')).body as PresetPage).total;
    expect(mine.tags.find(({ tag }) => tag === 'pond')?.count).toBe(pond);
    const counts = mine.tags.map(({ count }) => count);
    expect(counts).toEqual([...counts].sort((a, b) => b - a));
    expect(mine.owners.map(({ name }) => name)).not.toContain('Rui Maddock');
    const theirs = await choices(student);
    expect(theirs.tags.map(({ tag }) => tag)).not.toContain('a tag of nobody else');
    expect(theirs.owners.map(({ name }) => name)).toContain('Rui Maddock');
  });

  it('searches within what one may see: words of its scope find nothing', async () => {
    await make('Scoped newts', { visibility: 'lab', labId: DEMO_LAB.id });
    const titles = async (search: string) =>
      ((await researcher.get(`/presets?search=${encodeURIComponent(search)}`)).body as PresetPage).items.map(
        ({ title }) => title,
      );
    expect(await titles('scoped')).toEqual(['Scoped newts']);
    expect(await titles(DEMO_LAB.id)).toEqual([]);
    expect(await titles('own demo researcher')).toEqual([]);
    expect(await titles('scope : "starter" OR newts')).toEqual([]);
  });

  it('hides what is private to others', async () => {
    await make('Only mine');
    const student = await server.person('student');
    const titles = ((await student.get('/presets?search=only%20mine')).body as PresetPage).items;
    expect(titles).toEqual([]);
  });
});

describe('links', () => {
  it('open without an account until they are revoked', async () => {
    const { preset } = await make('By link');
    const made = (await researcher.post(`/presets/${preset.id}/links`, { label: 'reviewer' })).body as {
      token: string;
      link: { id: string };
    };
    const visitor = new Visitor(server.app);
    const opened = await visitor.get(`/shared/${made.token}`);
    expect([opened.status, (opened.body as { title: string }).title]).toEqual([200, 'By link']);
    const list = (await researcher.get(`/presets/${preset.id}/links`)).body as {
      links: { opened: number }[];
    };
    expect(list.links[0]?.opened).toBe(1);
    const student = await server.person('student');
    expect((await student.post(`/shared/${made.token}/copy`)).status).toBe(201);
    await researcher.send('delete', `/presets/${preset.id}/links/${made.link.id}`);
    expect((await visitor.get(`/shared/${made.token}`)).status).toBe(404);
    expect((await student.post(`/shared/${made.token}/copy`)).status).toBe(404);
  });

  it('are kept only as a hash', async () => {
    const { preset } = await make('Hashed');
    const made = (await researcher.post(`/presets/${preset.id}/links`, {})).body as { token: string };
    const [rows] = await server.database.sequelize.query('SELECT * FROM share_links');
    expect(JSON.stringify(rows)).not.toContain(made.token);
  });
});

describe('the database', () => {
  it('holds its settings on every connection', async () => {
    const read = async (pragma: string, transaction?: Transaction) => {
      const rows = await server.database.sequelize.query<Record<string, unknown>>(
        `SELECT * FROM pragma_${pragma}`,
        {
          type: QueryTypes.SELECT,
          ...(transaction ? { transaction } : {}),
        },
      );
      return Object.values(rows[0] ?? {})[0];
    };
    const [mode] = await server.database.sequelize.query('PRAGMA journal_mode', { type: QueryTypes.SELECT });
    expect(JSON.stringify(mode)).toContain('wal');
    expect(await read('foreign_keys')).toBe(1);
    await server.database.change(async (transaction) => {
      expect(await read('foreign_keys', transaction)).toBe(1);
      expect(await read('busy_timeout', transaction)).toBe(5000);
      expect(await read('synchronous', transaction)).toBe(2);
    });
  });

  it('keeps its data when it is seeded again', async () => {
    const count = () =>
      Promise.all([
        server.database.models.Preset.count(),
        server.database.models.PresetVersion.count(),
        server.database.models.User.count(),
      ]);
    const before = await count();
    await seedStarters(server.database);
    await seedDemo(server.dependencies);
    expect(await count()).toEqual(before);
  });

  it('steps back to nothing and forward again', async () => {
    const other = await startTestServer({ demo: false });
    const migrator = createMigrator(other.database);
    await migrator.down({ to: 0 });
    const [rows] = await other.database.sequelize.query(
      "SELECT name FROM sqlite_master WHERE name = 'presets'",
    );
    expect(rows).toEqual([]);
    await migrator.up();
    await seedStarters(other.database);
    expect(await other.database.models.Preset.count()).toBe(STARTER_PRESETS.length);
    await other.close();
  });
});
