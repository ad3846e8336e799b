import { PanelLeftClose, PanelLeftOpen, PanelRightClose, PanelRightOpen } from 'lucide-react';
import type { ReactNode } from 'react';

import { Button } from '@/components/ui/button';
import { joinClasses } from '@/lib/join-classes';

import { useBenchUi } from './bench-ui';
import { RailEdge, useRailWidth } from './rail-edge';
import { Sheet } from './sheet';
import { PHONE, useMedia, WIDE } from './use-media';

interface BenchLayoutProps {
  readonly header: ReactNode;
  readonly banner: ReactNode;
  readonly rail: ReactNode;
  readonly panes: ReactNode;
  readonly findings: ReactNode;
  readonly strip: ReactNode;
}

function RailToggle({
  side,
  open,
  onToggle,
}: {
  readonly side: 'model' | 'findings';
  readonly open: boolean;
  readonly onToggle: () => void;
}) {
  const Icon =
    side === 'model' ? (open ? PanelLeftClose : PanelLeftOpen) : open ? PanelRightClose : PanelRightOpen;
  return (
    <button
      type="button"
      aria-expanded={open}
      aria-label={`${open ? 'Hide' : 'Show'} the ${side}`}
      className={joinClasses(
        'absolute top-2.5 z-20 grid size-8 place-items-center rounded-md text-muted hover:bg-panel hover:text-ink',
        side === 'model' ? 'left-1' : 'right-1',
      )}
      onClick={onToggle}
    >
      <Icon size={16} aria-hidden />
    </button>
  );
}

/** Rail, panes and findings side by side; sheets on a tablet; one column on a phone. */
export function BenchLayout({ header, banner, rail, panes, findings, strip }: BenchLayoutProps) {
  const wide = useMedia(WIDE);
  const phone = useMedia(PHONE);
  const { railOpen, findingsOpen, sheet, set } = useBenchUi();
  const [railWidth, setRailWidth] = useRailWidth();
  const closeSheet = () => set({ sheet: null });
  const railDocked = wide && railOpen;
  const findingsDocked = wide && findingsOpen;
  return (
    <div className={joinClasses('flex flex-col bg-paper', phone ? 'min-h-dvh' : 'h-dvh overflow-hidden')}>
      <a
        href="#panes"
        className="sr-only focus:not-sr-only focus:absolute focus:z-50 focus:bg-raised focus:p-2"
      >
        Skip to the plots
      </a>
      {header}
      {banner}
      {wide ? null : (
        <div className="flex gap-2 border-b border-hairline px-4 py-1.5">
          <Button size="small" aria-expanded={sheet === 'model'} onClick={() => set({ sheet: 'model' })}>
            <PanelLeftOpen size={14} aria-hidden /> Model
          </Button>
          {phone ? null : (
            <Button
              size="small"
              className="ml-auto"
              aria-expanded={sheet === 'findings'}
              onClick={() => set({ sheet: 'findings' })}
            >
              Findings <PanelRightOpen size={14} aria-hidden />
            </Button>
          )}
        </div>
      )}
      <div className={joinClasses('flex min-h-0 flex-1', phone && 'flex-col')}>
        {railDocked ? (
          <aside aria-label="Model" className="flex min-h-0 shrink-0 bg-panel" style={{ width: railWidth }}>
            <div className="min-w-0 flex-1 overflow-y-auto">{rail}</div>
            <RailEdge width={railWidth} onChange={setRailWidth} />
          </aside>
        ) : null}
        <main
          id="panes"
          tabIndex={-1}
          className={joinClasses(
            'relative min-w-0 flex-1 outline-none',
            phone ? 'pb-4' : 'min-h-0 overflow-hidden',
          )}
        >
          {wide ? (
            <RailToggle side="model" open={railOpen} onToggle={() => set({ railOpen: !railOpen })} />
          ) : null}
          {wide ? (
            <RailToggle
              side="findings"
              open={findingsOpen}
              onToggle={() => set({ findingsOpen: !findingsOpen })}
            />
          ) : null}
          {panes}
        </main>
        {findingsDocked || phone ? (
          <aside
            aria-label="Findings"
            className={joinClasses(
              'min-h-0 shrink-0 bg-panel',
              phone ? 'border-t' : 'w-[19rem] overflow-y-auto border-l',
            )}
          >
            {findings}
          </aside>
        ) : null}
      </div>
      <div className={joinClasses('border-t border-hairline bg-paper', phone && 'sticky bottom-0 z-20')}>
        {strip}
      </div>
      {wide ? null : (
        <>
          <Sheet side="left" title="Model" open={sheet === 'model'} onClose={closeSheet}>
            {phone ? (
              <p className="border-b border-hairline px-4 py-2 text-sm text-muted">
                On a screen of this width the model can be read and scrubbed; it is edited on a wider one.
              </p>
            ) : null}
            {rail}
          </Sheet>
          <Sheet side="right" title="Findings" open={sheet === 'findings' && !phone} onClose={closeSheet}>
            {findings}
          </Sheet>
        </>
      )}
    </div>
  );
}
