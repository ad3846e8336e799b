import { useCommandContext } from './commands/use-command-context';
import { useShortcuts } from './commands/use-shortcuts';
import { BenchDialogs } from './dialogs/bench-dialogs';
import { LeaveGuard } from './drafts/leave-guard';
import { useKeepDraft } from './drafts/use-keep-draft';
import { Findings } from './findings';
import { WorkbenchHeader } from './header/workbench-header';
import { BenchLayout } from './layout/bench-layout';
import { Notice } from './layout/notice';
import { SharedBanner } from './layout/shared-banner';
import { isUnbegun, StartGuide } from './layout/start-guide';
import { PHONE, useMedia } from './layout/use-media';
import { useViewInUrl } from './layout/use-view-in-url';
import { Panes } from './panes';
import { ModelRail } from './rail';
import { useWorkbench } from './state/store';
import { RangeStrip } from './strip';

/** All of the workbench around one document: rails, panes, strip, commands and dialogs. */
export function Workbench({ draftKey }: { readonly draftKey: string | null }) {
  const context = useCommandContext();
  const readOnly = useMedia(PHONE);
  const unbegun = useWorkbench((state) => isUnbegun(state.document));
  useShortcuts(context);
  useViewInUrl();
  useKeepDraft(draftKey);
  return (
    <>
      <BenchLayout
        header={<WorkbenchHeader context={context} readOnly={readOnly} />}
        banner={<SharedBanner />}
        rail={<ModelRail readOnly={readOnly} />}
        panes={unbegun && !readOnly ? <StartGuide /> : <Panes />}
        findings={<Findings />}
        strip={<RangeStrip />}
      />
      <BenchDialogs context={context} />
      <LeaveGuard />
      <Notice />
    </>
  );
}
