import type { PresetChoices, PresetPage, PresetQuery } from '@/contract/presets';
import { roleMay } from '@/contract/rights';

import type { Dependencies } from '../dependencies';
import type { Person } from '../middleware/current-user';
import type { ReadValues } from '../models/reader';

const ORDERS: Record<PresetQuery['sort'], { by: string; usual: 'ASC' | 'DESC'; owner?: true }> = {
  changed: { by: 'f.changedAt', usual: 'DESC' },
  created: { by: 'f.createdAt', usual: 'DESC' },
  title: { by: 'f.title COLLATE NOCASE', usual: 'ASC' },
  owner: { by: "COALESCE(o.name, '') COLLATE NOCASE", usual: 'ASC', owner: true },
};
const TAGS_SHOWN = 40;
const OWNERS_SHOWN = 200;
const MOST_WORDS = 12;

/** Words as typed, each to be found at the beginning of a word; quoted, so that no operator is read into them. */
function wordsToMatch(search: string): string | null {
  const words = search.match(/[\p{L}\p{N}]+/gu) ?? [];
  return words.length === 0
    ? null
    : words
        .slice(0, MOST_WORDS)
        .map((word) => `"${word}"*`)
        .join(' ');
}

/** The words within what the person may see, as the scope column of the search has it. */
function matchFor(search: string, personId: string, labs: readonly string[]): string | null {
  const words = wordsToMatch(search);
  if (words === null) return null;
  const scopes = ['starter', `own ${personId}`, ...labs.map((id) => `lab ${id}`)];
  const scope = scopes.map((one) => `"${one.replaceAll('"', '""')}"`).join(' OR ');
  return `scope : (${scope}) AND {title summary tags} : (${words})`;
}

const SEEN_FIELDS = 'id, ownerId, visibility, title, createdAt, changedAt';

/** What the person may see, part by part, so that each is found by its own index. */
const SEEN = `seen AS MATERIALIZED (
  SELECT ${SEEN_FIELDS} FROM presets WHERE visibility = 'starter' AND deletedAt IS NULL
  UNION ALL
  SELECT ${SEEN_FIELDS} FROM presets WHERE ownerId = $me AND visibility = 'private' AND deletedAt IS NULL
  UNION ALL
  SELECT ${SEEN_FIELDS} FROM presets WHERE labId IN (SELECT value FROM json_each($labs)) AND visibility = 'lab' AND deletedAt IS NULL
)`;

const time = (column: string) => `strftime('%Y-%m-%dT%H:%M:%fZ', ${column})`;
const named = (table: string) =>
  `CASE WHEN ${table}.id IS NULL THEN NULL ELSE json_object('id', ${table}.id, 'name', ${table}.name) END`;

/** CROSS JOIN keeps the order of reading: from the few that are found to what belongs to each. */
const ITEMS = `json_object(
  'id', p.id, 'title', p.title, 'summary', p.summary, 'tagLines', p.tagLines, 'visibility', p.visibility,
  'owner', json(${named('u')}), 'lab', json(${named('l')}), 'version', p.headNumber,
  'changedAt', ${time('p.changedAt')}, 'createdAt', ${time('p.createdAt')}, 'populations', json(p.populations)
)`;
const TAGS = `SELECT json_group_array(json_object('tag', tag, 'count', n) ORDER BY n DESC, tag) FROM (
  SELECT t.tag AS tag, COUNT(*) AS n FROM seen CROSS JOIN preset_tags t ON t.presetId = seen.id
  GROUP BY t.tag ORDER BY n DESC, t.tag LIMIT $tags
)`;
const OWNERS = `SELECT json_group_array(json_object('id', id, 'name', name) ORDER BY name) FROM (
  SELECT u.id, u.name FROM (SELECT DISTINCT ownerId FROM seen WHERE ownerId <> $me) o
  CROSS JOIN users u ON u.id = o.ownerId ORDER BY u.name LIMIT $owners
)`;

const labsSeenBy = (person: Person) =>
  person.memberships.filter(({ role }) => roleMay(role, 'view lab presets')).map(({ labId }) => labId);

type Condition = { readonly text: string; readonly values?: ReadValues };

/** What was asked for, each with the values that its text names. */
function conditionsOf(query: PresetQuery, personId: string, match: string | null): Condition[] {
  const conditions: Condition[] = [];
  // A search without a letter or a digit finds nothing.
  if (query.search !== '')
    conditions.push(
      match === null
        ? { text: '0' }
        : {
            text: `s.id IN (SELECT r.presetId FROM preset_words w CROSS JOIN preset_word_rows r ON r.number = w.rowid
              WHERE preset_words MATCH $match)`,
            values: { match },
          },
    );
  if (query.tag)
    conditions.push({
      text: 'EXISTS (SELECT 1 FROM preset_tags t WHERE t.presetId = s.id AND t.tag = $tag)',
      values: { tag: query.tag },
    });
  if (query.owner)
    conditions.push({
      text: 's.ownerId = $owner',
      values: { owner: query.owner === 'me' ? personId : query.owner },
    });
  if (query.kind === 'own') conditions.push({ text: 's.ownerId = $me' });
  else if (query.kind !== 'all')
    conditions.push({ text: 's.visibility = $kind', values: { kind: query.kind } });
  return conditions;
}

type Item = Omit<PresetPage['items'][number], 'tags' | 'starter'> & { readonly tagLines: string };

interface Row {
  readonly items: string;
  readonly total: number;
}

/** A page of the library as one person may see it, in one statement. */
export async function listPresets(
  { database }: Dependencies,
  person: Person,
  query: PresetQuery,
): Promise<PresetPage> {
  const labs = labsSeenBy(person);
  const match = matchFor(query.search, person.id, labs);
  const { by, usual, owner } = ORDERS[query.sort];
  const direction = query.order === undefined ? usual : query.order === 'ascending' ? 'ASC' : 'DESC';
  const conditions = conditionsOf(query, person.id, match);
  const where = ['1', ...conditions.map(({ text }) => text)].join(' AND ');
  const [row] = await database.read<Row>(
    `WITH ${SEEN}, found AS MATERIALIZED (SELECT s.* FROM seen s WHERE ${where}),
     page AS MATERIALIZED (
       SELECT f.id, ROW_NUMBER() OVER (ORDER BY ${by} ${direction}, f.id) AS place
       FROM found f ${owner ? 'LEFT JOIN users o ON o.id = f.ownerId' : ''}
       ORDER BY place LIMIT $limit OFFSET $offset
     )
     SELECT (SELECT COUNT(*) FROM found) AS total,
       (SELECT json_group_array(${ITEMS} ORDER BY page.place) FROM page CROSS JOIN presets p ON p.id = page.id
        LEFT JOIN users u ON u.id = p.ownerId LEFT JOIN labs l ON l.id = p.labId) AS items`,
    {
      me: person.id,
      labs: JSON.stringify(labs),
      limit: query.pageSize,
      offset: (query.page - 1) * query.pageSize,
      ...Object.assign({}, ...conditions.map(({ values }) => values)),
    },
  );
  if (row === undefined) throw new Error('The database gave no page.');
  const items = JSON.parse(row.items) as Item[];
  return {
    items: items.map(({ tagLines, ...item }) => ({
      ...item,
      tags: tagLines.split('\n').filter(Boolean),
      starter: item.visibility === 'starter',
    })),
    total: row.total,
    page: query.page,
    pageSize: query.pageSize,
  };
}

/** What the library of one person can be narrowed by. */
export async function listChoices({ database }: Dependencies, person: Person): Promise<PresetChoices> {
  const [row] = await database.read<Record<'tags' | 'owners', string>>(
    `WITH ${SEEN} SELECT (${TAGS}) AS tags, (${OWNERS}) AS owners`,
    {
      me: person.id,
      labs: JSON.stringify(labsSeenBy(person)),
      tags: TAGS_SHOWN,
      owners: OWNERS_SHOWN,
    },
  );
  if (row === undefined) throw new Error('The database gave no choices.');
  return {
    tags: JSON.parse(row.tags) as PresetChoices['tags'],
    owners: JSON.parse(row.owners) as PresetChoices['owners'],
  };
}
