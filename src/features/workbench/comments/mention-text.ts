import type { CommentPerson } from '@/contract/comments';

const isLetter = (character: string | undefined) =>
  character !== undefined && /[\p{L}\p{N}]/u.test(character);

/** The mention being typed before the caret: where its `@` stands, and what follows it. */
export function mentionAt(
  text: string,
  caret: number,
): { readonly start: number; readonly query: string } | null {
  const found = /@([^@\n]{0,40})$/u.exec(text.slice(0, caret));
  if (!found || isLetter(text[found.index - 1])) return null;
  return { start: found.index, query: found[1] ?? '' };
}

/** People whose name, or a word of it, begins with what was typed. */
export function peopleFor(people: readonly CommentPerson[], query: string): readonly CommentPerson[] {
  const wanted = query.toLocaleLowerCase();
  return people
    .filter(({ name }) => {
      const lower = name.toLocaleLowerCase();
      return lower.startsWith(wanted) || lower.split(/\s+/).some((word) => word.startsWith(wanted));
    })
    .slice(0, 6);
}

/** The text as it is sent: a picked or typed `@Name` becomes the person. Of people of one name, the first given. */
export function withIds(text: string, people: readonly CommentPerson[]): string {
  const longestFirst = people.toSorted((a, b) => b.name.length - a.name.length);
  let sent = '';
  for (let at = 0; at < text.length;) {
    const rest = text.slice(at + 1);
    const person =
      text[at] === '@' && !isLetter(text[at - 1])
        ? longestFirst.find(({ name }) => rest.startsWith(name) && !isLetter(rest[name.length]))
        : undefined;
    sent += person ? `@{${person.id}}` : text[at];
    at += person ? person.name.length + 1 : 1;
  }
  return sent;
}

/** The text as it is written and read: people by their names. */
export function withNames(
  text: string,
  people: readonly CommentPerson[],
  mark: (name: string) => string = (name) => `@${name}`,
): string {
  const names = new Map(people.map(({ id, name }) => [id, name]));
  return text.replace(/@\{([\w-]{1,64})\}/g, (_whole, id: string) => mark(names.get(id) ?? 'someone'));
}

/** A name in bold, with nothing in it read as Markdown. */
export function boldName(name: string): string {
  return `**@${name.replace(/[\\`*_{}[\]()#+\-.!|<>~$]/g, '\\$&')}**`;
}
