import { Search } from 'lucide-react';
import { useEffect, useState } from 'react';

import { INPUT_CLASSES } from '@/components/ui/form-field';
import type { PresetChoices, PresetQuery } from '@/contract/presets';

interface LibraryFiltersProps {
  readonly query: PresetQuery;
  readonly choices: PresetChoices | undefined;
  readonly onChange: (patch: Partial<PresetQuery>) => void;
}

const PAUSE_MILLISECONDS = 200;

function SearchField({
  value,
  onChange,
}: {
  readonly value: string;
  readonly onChange: (text: string) => void;
}) {
  const [text, setText] = useState(value);
  const [seen, setSeen] = useState(value);
  if (seen !== value) {
    setSeen(value);
    setText(value);
  }
  useEffect(() => {
    if (text === value) return;
    const timer = setTimeout(() => onChange(text), PAUSE_MILLISECONDS);
    return () => clearTimeout(timer);
  }, [text, value, onChange]);
  return (
    <label className="relative min-w-52 flex-1">
      <span className="sr-only">Search presets</span>
      <Search size={16} aria-hidden className="absolute top-2.5 left-2.5 text-muted" />
      <input
        type="search"
        className={`${INPUT_CLASSES} pl-8`}
        placeholder="Search titles, summaries and tags"
        value={text}
        onChange={(event) => setText(event.target.value)}
      />
    </label>
  );
}

function Choice<T extends string>({
  label,
  value,
  choices,
  onChange,
}: {
  readonly label: string;
  readonly value: T;
  readonly choices: readonly (readonly [T, string])[];
  readonly onChange: (value: T) => void;
}) {
  return (
    <label className="flex items-center gap-2">
      <span className="text-sm text-muted">{label}</span>
      <select className={INPUT_CLASSES} value={value} onChange={(event) => onChange(event.target.value as T)}>
        {choices.map(([key, words]) => (
          <option key={key} value={key}>
            {words}
          </option>
        ))}
      </select>
    </label>
  );
}

export function LibraryFilters({ query, choices, onChange }: LibraryFiltersProps) {
  const owners = [
    ['', 'anyone'] as const,
    ['me', 'me'] as const,
    ...(choices?.owners ?? []).map((owner) => [owner.id, owner.name] as const),
  ];
  const tags: (readonly [string, string])[] = [
    ['', 'any'],
    ...(choices?.tags ?? []).map(({ tag, count }) => [tag, `${tag} (${count})`] as const),
  ];
  if (query.tag && !tags.some(([tag]) => tag === query.tag)) tags.push([query.tag, query.tag]);
  return (
    <div role="search" aria-label="Presets" className="flex flex-wrap items-center gap-3">
      <SearchField value={query.search} onChange={(search) => onChange({ search })} />
      <Choice
        label="Show"
        value={query.kind}
        choices={[
          ['all', 'all'],
          ['starter', 'starters'],
          ['own', 'my own'],
          ['lab', "my labs'"],
        ]}
        onChange={(kind) => onChange({ kind })}
      />
      <Choice label="Owner" value={query.owner} choices={owners} onChange={(owner) => onChange({ owner })} />
      <Choice label="Tag" value={query.tag} choices={tags} onChange={(tag) => onChange({ tag })} />
      <Choice
        label="Sort"
        value={query.sort}
        choices={[
          ['changed', 'last changed'],
          ['created', 'newest'],
          ['title', 'title'],
          ['owner', 'owner'],
        ]}
        onChange={(sort) => onChange({ sort })}
      />
    </div>
  );
}
