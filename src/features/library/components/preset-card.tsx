import { MoreHorizontal } from 'lucide-react';
import { Link } from 'react-router-dom';

import { Menu, MenuItem } from '@/components/layout/menu';
import type { PresetSummary } from '@/contract/presets';
import { formatDay } from '@/lib/format';

import { PopulationDots } from './population-dots';

interface PresetCardProps {
  readonly preset: PresetSummary;
  readonly mine: boolean;
  readonly onTag: (tag: string) => void;
  readonly onDuplicate: (id: string) => void;
  readonly onDelete: (preset: PresetSummary) => void;
  /** Null for those who set no sweeps. */
  readonly onSetSweep: ((preset: PresetSummary) => void) | null;
}

function Whose({ preset, mine }: { readonly preset: PresetSummary; readonly mine: boolean }) {
  if (preset.starter)
    return <span className="rounded-full border border-accent px-2 text-sm text-accent">starter</span>;
  const owner = mine ? 'yours' : (preset.owner?.name ?? 'unknown');
  return (
    <span className="text-sm text-muted">
      {owner}
      {preset.visibility === 'lab' && preset.lab ? `, open to ${preset.lab.name}` : ''}
    </span>
  );
}

export function PresetCard(props: PresetCardProps) {
  const { preset, mine, onTag, onDuplicate, onDelete, onSetSweep } = props;
  return (
    <li className="relative grid content-between gap-3 rounded-lg border bg-raised p-4 focus-within:border-accent hover:border-muted">
      <div className="grid gap-1.5">
        <div className="flex items-start justify-between gap-2">
          <h2 className="text-lg">
            <Link to={`/presets/${preset.id}`} className="after:absolute after:inset-0 hover:underline">
              {preset.title}
            </Link>
          </h2>
          <Menu
            trigger={
              <button
                type="button"
                aria-label={`More for ${preset.title}`}
                className="relative z-10 rounded p-1 text-muted hover:bg-panel hover:text-ink"
              >
                <MoreHorizontal size={18} aria-hidden />
              </button>
            }
          >
            <MenuItem onSelect={() => onDuplicate(preset.id)}>Duplicate to my presets</MenuItem>
            {onSetSweep ? (
              <MenuItem onSelect={() => onSetSweep(preset)}>Set as an assigned sweep…</MenuItem>
            ) : null}
            {mine ? <MenuItem onSelect={() => onDelete(preset)}>Delete…</MenuItem> : null}
          </Menu>
        </div>
        <PopulationDots populations={preset.populations} />
        <p className="line-clamp-3 text-muted">{preset.summary}</p>
      </div>
      <div className="grid gap-2">
        {preset.tags.length > 0 ? (
          <ul aria-label="Tags" className="flex flex-wrap gap-1">
            {preset.tags.map((tag) => (
              <li key={tag}>
                <button
                  type="button"
                  onClick={() => onTag(tag)}
                  className="relative z-10 rounded-full bg-panel px-2 text-sm hover:underline"
                >
                  {tag}
                </button>
              </li>
            ))}
          </ul>
        ) : null}
        <p className="flex flex-wrap items-center justify-between gap-2 text-sm text-muted">
          <Whose preset={preset} mine={mine} />
          <span>
            version {preset.version}, {formatDay(preset.changedAt)}
          </span>
        </p>
      </div>
    </li>
  );
}
