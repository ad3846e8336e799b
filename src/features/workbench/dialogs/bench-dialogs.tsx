import { HandInDialog } from '../assigned/hand-in-dialog';
import type { CommandContext } from '../commands/command';
import { CommandPalette } from '../commands/command-palette';
import { useBenchUi } from '../layout/bench-ui';
import { EquationsDialog } from './equations-dialog';
import { ExportModelDialog } from './export-model-dialog';
import { HistoryDialog } from './history-dialog';
import { ImportDialog } from './import-dialog';
import { PictureDialog } from './picture-dialog';
import { SaveCopyDialog } from './save-copy-dialog';
import { SaveDialog } from './save-dialog';
import { ShareDialog } from './share-dialog';
import { ShortcutsDialog } from './shortcuts-dialog';

/** The dialog that is open, if any; each begins afresh when it is opened. */
export function BenchDialogs({ context }: { readonly context: () => CommandContext }) {
  const dialog = useBenchUi((state) => state.dialog);
  return (
    <>
      <CommandPalette context={context} />
      {dialog === 'shortcuts' ? <ShortcutsDialog context={context} /> : null}
      {dialog === 'save' ? <SaveDialog /> : null}
      {dialog === 'save-copy' ? <SaveCopyDialog /> : null}
      {dialog === 'share' ? <ShareDialog /> : null}
      {dialog === 'history' ? <HistoryDialog /> : null}
      {dialog === 'export' ? <ExportModelDialog /> : null}
      {dialog === 'import' ? <ImportDialog /> : null}
      {dialog === 'equations' ? <EquationsDialog /> : null}
      {dialog === 'picture' ? <PictureDialog /> : null}
      {dialog === 'hand-in' ? <HandInDialog /> : null}
    </>
  );
}
