import { describe, expect, it } from 'vitest';

import {
  boldName,
  mentionAt,
  peopleFor,
  withIds,
  withNames,
} from '@/features/workbench/comments/mention-text';

const PEOPLE = [
  { id: 'a1', name: 'Ada' },
  { id: 'a2', name: 'Ada Fennimore' },
  { id: 'r1', name: 'Rui Maddock' },
];

describe('mentions in a text', () => {
  it('are found before the caret, and not in an address', () => {
    expect(mentionAt('See @Ru', 7)).toEqual({ start: 4, query: 'Ru' });
    expect(mentionAt('@', 1)).toEqual({ start: 0, query: '' });
    expect(mentionAt('mail ada@example', 16)).toBeNull();
    expect(mentionAt('@Rui\nthen', 9)).toBeNull();
  });

  it('are offered by the beginning of any word of a name', () => {
    expect(peopleFor(PEOPLE, 'mad').map(({ id }) => id)).toEqual(['r1']);
    expect(peopleFor(PEOPLE, 'ada').map(({ id }) => id)).toEqual(['a1', 'a2']);
    expect(peopleFor(PEOPLE, 'nobody')).toEqual([]);
  });

  it('are sent by id, the longest name first, and come back by name', () => {
    const sent = withIds('@Ada Fennimore and @Ada, not @Adalbert or x@Ada', PEOPLE);
    expect(sent).toBe('@{a2} and @{a1}, not @Adalbert or x@Ada');
    expect(withNames(sent, PEOPLE)).toBe('@Ada Fennimore and @Ada, not @Adalbert or x@Ada');
    expect(withNames('@{gone}', PEOPLE)).toBe('@someone');
  });

  it('show a name without reading Markdown into it', () => {
    expect(boldName('A*b_<c>')).toBe('**@A\\*b\\_\\<c\\>**');
  });
});
