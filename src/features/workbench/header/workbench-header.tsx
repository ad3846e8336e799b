import { Command as CommandIcon, MoreHorizontal, Redo2, Undo2 } from 'lucide-react';
import { Link } from 'react-router-dom';

import { AppHeader } from '@/components/layout/app-header';
import { Menu, MenuItem } from '@/components/layout/menu';
import { buttonClasses } from '@/components/ui/button';

import { labelOf, type CommandContext } from '../commands/command';
import { comments } from '../commands/comments';
import { exportModel } from '../commands/export-model';
import { handIn } from '../commands/hand-in';
import { importModel } from '../commands/import-model';
import { openPalette } from '../commands/open-palette';
import { redo } from '../commands/redo';
import { saveCopy } from '../commands/save-copy';
import { saveVersion } from '../commands/save-version';
import { share } from '../commands/share';
import { undo } from '../commands/undo';
import { versionHistory } from '../commands/version-history';
import { useWorkbench } from '../state/store';
import { CommandButton } from './command-button';
import { CommentsButton } from './comments-button';
import { TitleField } from './title-field';
import { VersionChip } from './version-chip';

const MORE = [comments, versionHistory, saveCopy, importModel, share, exportModel] as const;

function Breadcrumb({ readOnly }: { readonly readOnly: boolean }) {
  const origin = useWorkbench((state) => state.origin);
  const place =
    origin.kind === 'shared'
      ? 'Shared preset'
      : origin.kind === 'assigned'
        ? origin.labName
        : origin.kind === 'preset'
          ? (origin.labName ?? (origin.starter ? 'Starter presets' : 'My presets'))
          : 'New preset';
  return (
    <nav aria-label="Breadcrumb" className="flex min-w-0 items-center gap-2">
      <span className="shrink-0 text-muted max-lg:hidden">
        {origin.kind === 'shared' ? (
          place
        ) : (
          <Link
            to={origin.kind === 'assigned' ? `/assigned/${origin.id}` : '/presets'}
            className="hover:text-ink hover:underline"
          >
            {place}
          </Link>
        )}
        <span aria-hidden className="pl-2">
          /
        </span>
      </span>
      <TitleField readOnly={readOnly} />
      <VersionChip />
    </nav>
  );
}

function MoreMenu({ context }: { readonly context: () => CommandContext }) {
  return (
    <Menu
      trigger={
        <button type="button" aria-label="More commands" className={buttonClasses('quiet', 'normal', 'px-2')}>
          <MoreHorizontal size={18} aria-hidden />
        </button>
      }
    >
      {MORE.map((command) => {
        const now = context();
        return (
          <MenuItem
            key={command.id}
            disabled={command.isEnabled(now) !== true}
            onSelect={() => command.perform(context())}
          >
            {labelOf(command, now)}
          </MenuItem>
        );
      })}
    </Menu>
  );
}

/** The bar of the workbench: where one is, what is saved, and what can be done with it. */
export function WorkbenchHeader({
  context,
  readOnly,
}: {
  readonly context: () => CommandContext;
  readonly readOnly: boolean;
}) {
  // Buttons tell of the state they stand for.
  const state = useWorkbench((whole) => whole);
  const copies =
    saveVersion.isEnabled(context()) !== true &&
    state.origin.kind !== 'new' &&
    !(state.origin.kind === 'preset' && state.origin.rights.includes('save'));
  const assigned = state.origin.kind === 'assigned';
  const save = assigned ? handIn : copies ? saveCopy : saveVersion;
  return (
    <AppHeader
      actions={
        <>
          <span className="flex max-sm:hidden">
            <CommandButton command={undo} context={context} look="quiet" className="px-2">
              <Undo2 size={17} aria-hidden />
            </CommandButton>
            <CommandButton command={redo} context={context} look="quiet" className="px-2">
              <Redo2 size={17} aria-hidden />
            </CommandButton>
            <CommandButton command={openPalette} context={context} look="quiet" className="px-2">
              <CommandIcon size={16} aria-hidden />
            </CommandButton>
          </span>
          <CommentsButton context={context} />
          <MoreMenu context={context} />
          <CommandButton named command={share} context={context} className="max-lg:hidden">
            Share
          </CommandButton>
          <CommandButton named command={exportModel} context={context} className="max-lg:hidden">
            Export
          </CommandButton>
          <CommandButton named command={save} context={context} look="primary" className="max-sm:hidden">
            {assigned ? 'Hand in' : copies ? 'Save a copy' : 'Save version'}
          </CommandButton>
        </>
      }
    >
      <Breadcrumb readOnly={readOnly} />
    </AppHeader>
  );
}
