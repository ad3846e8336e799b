import type { PresetBody } from '@/contract/presets';

import { pick, type Draw } from '../../server/seeds/load/random';
import type { Answer, Client } from './client';

/** Someone at work, with what they opened before. */
export interface Visitor {
  readonly client: Client;
  readonly labId: string;
  readonly supervises: boolean;
  readonly presets: string[];
  readonly sweeps: string[];
  /** One of their own, which nobody else saves. */
  own: PresetBody | null;
}

export interface Visit {
  readonly name: string;
  /** How often, beside the others. */
  readonly weight: number;
  /** Medians and 99th percentiles wanted, in milliseconds; null where none is set. */
  readonly target: { readonly median: number; readonly most: number | null } | null;
  go(visitor: Visitor, draw: Draw): Promise<Answer>;
}

const LIST = { median: 50, most: 200 };
const SEARCHES = [
  'newts',
  'springtails fen',
  'harvest',
  'voles heath',
  'drought ice',
  'two sex',
  'spiders',
  'ke',
];
const TAGS = ['stages', 'harvest', 'pilot', 'review', 'draft'];

const read =
  (path: (visitor: Visitor, draw: Draw) => string) =>
  (visitor: Visitor, draw: Draw): Promise<Answer> =>
    visitor.client.send('GET', path(visitor, draw));

export const VISITS: readonly Visit[] = [
  {
    name: 'presets, first page',
    weight: 12,
    target: LIST,
    go: read(() => '/presets'),
  },
  {
    name: 'presets, further pages and orders',
    weight: 8,
    target: LIST,
    go: read((_visitor, draw) => {
      const sort = pick(draw, ['changed', 'title', 'owner', 'created']);
      return `/presets?sort=${sort}&page=${1 + Math.floor(draw() * 3)}`;
    }),
  },
  {
    name: 'presets by tag',
    weight: 6,
    target: LIST,
    go: read((_visitor, draw) => `/presets?tag=${encodeURIComponent(pick(draw, TAGS))}`),
  },
  {
    name: 'presets by kind',
    weight: 6,
    target: LIST,
    go: read((_visitor, draw) => `/presets?kind=${pick(draw, ['own', 'lab', 'starter'])}`),
  },
  { name: 'tags and owners to choose from', weight: 3, target: LIST, go: read(() => '/presets/choices') },
  {
    name: 'search',
    weight: 16,
    target: LIST,
    go: read((_visitor, draw) => `/presets?search=${encodeURIComponent(pick(draw, SEARCHES))}`),
  },
  {
    name: 'open a preset',
    weight: 14,
    target: LIST,
    go: read(({ presets }, draw) => `/presets/${pick(draw, presets)}`),
  },
  {
    name: 'versions of a preset',
    weight: 6,
    target: LIST,
    go: read(({ presets }, draw) => `/presets/${pick(draw, presets)}/versions`),
  },
  { name: 'the lab and its people', weight: 6, target: LIST, go: read(({ labId }) => `/labs/${labId}`) },
  {
    name: 'assigned sweeps of the lab',
    weight: 6,
    target: LIST,
    go: read(({ labId }) => `/labs/${labId}/assigned`),
  },
  { name: 'assigned sweeps of mine', weight: 6, target: LIST, go: read(() => '/assigned') },
  {
    name: 'people by findings',
    weight: 3,
    target: null,
    go: read(
      ({ supervises, sweeps }, draw) => `/assigned/${pick(draw, sweeps)}/${supervises ? 'table' : 'task'}`,
    ),
  },
  { name: 'who is signed in', weight: 5, target: LIST, go: read(() => '/session') },
  {
    name: 'save a version',
    weight: 6,
    target: { median: 100, most: null },
    go: async (visitor) => {
      const { own } = visitor;
      if (own === null) throw new Error('This visitor has nothing of their own to save.');
      const { id } = own.preset;
      const content = { document: own.document, note: 'Saved again', baseVersion: own.version.number };
      const answer = await visitor.client.send('POST', `/presets/${id}/versions`, content);
      if (answer.status === 201) visitor.own = JSON.parse(answer.body) as PresetBody;
      return answer;
    },
  },
];
