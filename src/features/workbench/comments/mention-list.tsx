import type { CommentPerson } from '@/contract/comments';
import { joinClasses } from '@/lib/join-classes';

/** People that the mention being typed may mean; moved through from the text field. */
export function MentionList({
  id,
  people,
  active,
  onPick,
}: {
  readonly id: string;
  readonly people: readonly CommentPerson[];
  readonly active: number;
  readonly onPick: (person: CommentPerson) => void;
}) {
  return (
    <ul
      id={id}
      role="listbox"
      aria-label="People to mention"
      className="rounded-md border bg-raised py-1 shadow"
    >
      {people.map((person, index) => (
        <li
          key={person.id}
          id={`${id}-${index}`}
          role="option"
          aria-selected={index === active}
          className={joinClasses('cursor-pointer px-2 py-0.5', index === active && 'bg-panel')}
          // The field keeps the focus.
          onPointerDown={(event) => event.preventDefault()}
          onClick={() => onPick(person)}
        >
          {person.name}
        </li>
      ))}
    </ul>
  );
}
