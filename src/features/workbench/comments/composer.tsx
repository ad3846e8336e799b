import { useQuery } from '@tanstack/react-query';
import { useId, useRef, useState, type KeyboardEvent } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { COMPACT_INPUT } from '@/components/fields/field-styles';
import { Button } from '@/components/ui/button';
import { COMMENT_LIMITS, type CommentPerson } from '@/contract/comments';
import { joinClasses } from '@/lib/join-classes';
import { plural } from '@/lib/format';

import { listPeople } from './api/comment-operations';
import { useKeptText } from './kept-text';
import { MentionList } from './mention-list';
import { mentionAt, peopleFor, withIds } from './mention-text';

interface ComposerProps {
  readonly presetId: string;
  readonly label: string;
  readonly action: string;
  /** Where the text is kept until it is sent. */
  readonly keptAs: string;
  readonly initial?: string;
  readonly mentioned?: readonly CommentPerson[];
  readonly busy: boolean;
  readonly error: string | null;
  readonly focus?: boolean;
  /** Sends; the text is forgotten once it has arrived. */
  readonly onSend: (text: string, sent: () => void) => void;
  readonly onCancel?: () => void;
}

/** A field for Markdown in which people are mentioned by `@`. */
export function Composer(props: ComposerProps) {
  const {
    presetId,
    label,
    action,
    keptAs,
    initial = '',
    mentioned = [],
    busy,
    error,
    onSend,
    onCancel,
  } = props;
  const id = useId();
  const field = useRef<HTMLTextAreaElement>(null);
  const [text, setText] = useKeptText(keptAs, initial);
  const [caret, setCaret] = useState(0);
  const [active, setActive] = useState(0);
  const [closedAt, setClosedAt] = useState<number | null>(null);
  const [picked, setPicked] = useState<readonly CommentPerson[]>([]);
  const known = useQuery({
    queryKey: ['comment-people', presetId],
    queryFn: () => listPeople(presetId),
    staleTime: 60_000,
  });
  const people = known.data?.people ?? [];
  const typed = mentionAt(text, caret);
  const found = typed && typed.start !== closedAt ? peopleFor(people, typed.query) : [];
  const whole = found.some(({ name }) => name === typed?.query.trimEnd());
  const choices = whole ? [] : found;

  const pick = (person: CommentPerson) => {
    if (!typed) return;
    const before = `${text.slice(0, typed.start)}@${person.name} `;
    setText(before + text.slice(caret));
    setPicked([person, ...picked]);
    setClosedAt(typed.start);
    setCaret(before.length);
    requestAnimationFrame(() => field.current?.setSelectionRange(before.length, before.length));
  };
  const send = () => {
    if (text.trim() === '' || busy) return;
    onSend(withIds(text, [...picked, ...mentioned, ...people]), () => setText(''));
  };
  const handleKey = (event: KeyboardEvent) => {
    if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) {
      event.preventDefault();
      return send();
    }
    const chosen = choices[active];
    if (chosen === undefined) return;
    if (event.key === 'ArrowDown') setActive((active + 1) % choices.length);
    else if (event.key === 'ArrowUp') setActive((active + choices.length - 1) % choices.length);
    else if (event.key === 'Enter' || event.key === 'Tab') pick(chosen);
    else if (event.key === 'Escape') setClosedAt(typed?.start ?? null);
    else return;
    event.preventDefault();
    event.stopPropagation();
  };
  const follow = (element: HTMLTextAreaElement) => {
    setCaret(element.selectionStart);
    setActive(0);
  };

  return (
    <div className="grid gap-1.5">
      <label htmlFor={id} className="text-sm font-medium">
        {label}
      </label>
      <textarea
        ref={field}
        id={id}
        rows={3}
        value={text}
        autoFocus={props.focus ?? false}
        maxLength={COMMENT_LIMITS.textLength}
        aria-autocomplete="list"
        aria-controls={choices.length > 0 ? `${id}-people` : undefined}
        aria-activedescendant={choices.length > 0 ? `${id}-people-${active}` : undefined}
        aria-describedby={`${id}-help`}
        className={joinClasses('w-full py-1.5 leading-snug', COMPACT_INPUT)}
        onChange={(event) => {
          setText(event.target.value);
          setClosedAt(null);
          follow(event.target);
        }}
        onClick={(event) => follow(event.currentTarget)}
        onBlur={() => setClosedAt(typed?.start ?? null)}
        onKeyDown={handleKey}
      />
      {choices.length > 0 ? (
        <MentionList id={`${id}-people`} people={choices} active={active} onPick={pick} />
      ) : null}
      <p id={`${id}-help`} className="text-xs text-muted">
        Markdown, with mathematics between dollars. Type @ to mention someone.
      </p>
      <p role="status" className="sr-only">
        {choices.length > 0
          ? `${plural(choices.length, 'person', 'people')}. Arrow keys choose, Enter picks.`
          : ''}
      </p>
      {error ? <FieldMessage>{error}</FieldMessage> : null}
      <div className="flex gap-2">
        <Button size="small" look="primary" disabled={busy || text.trim() === ''} onClick={send}>
          {busy ? 'Sending…' : action}
        </Button>
        {onCancel ? (
          <Button
            size="small"
            look="quiet"
            onClick={() => {
              setText('');
              onCancel();
            }}
          >
            Cancel
          </Button>
        ) : null}
      </div>
    </div>
  );
}
