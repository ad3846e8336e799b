import { Download, Table2 } from 'lucide-react';
import { useCallback, useEffect, useRef, useState, type KeyboardEvent } from 'react';

import { plotFigure } from '@/graphics/plot-figure';
import { layoutPlot } from '@/graphics/plot-layout';
import { PALETTES } from '@/graphics/palette';
import type { LegendItem, PlotSpec } from '@/graphics/plot-spec';
import { plotTables } from '@/graphics/plot-table';
import { formatShort } from '@/graphics/numbers';
import { joinClasses } from '@/lib/join-classes';
import { useTheme } from '@/lib/theme';

import { useWorkbench, useWorkbenchStore } from '../../state/store';
import type { ViewInput } from '../views/view-input';
import { useShownModel } from '../use-shown-model';
import { watchPictures } from '../watch-pictures';
import { ExportDialog } from './export-dialog';
import type { ExportSource } from './export-source';
import { PlotHandles } from './plot-handles';
import { PlotLegend } from './plot-legend';
import { walk, type Reading, type Walk } from './plot-reading';
import { PlotView } from './plot-view';
import { zoomedView, isSensible } from './plot-zoom';
import { TableDialog } from './table-dialog';
import { usePlotPointer } from './use-plot-pointer';

interface PlotFrameProps {
  readonly build: (input: ViewInput) => PlotSpec;
  readonly axes: ViewInput['axes'];
  readonly onMoveHandle: (id: string, x: number, y: number) => void;
  /** Told after each drawing, e.g. to ask the engine for the slice that is on show. */
  readonly onDrawn?: (view: PlotView) => void;
}

interface Chrome {
  readonly key: string;
  readonly legend: readonly LegendItem[];
  readonly notes: readonly string[];
  readonly empty: string | null;
  readonly title: string;
  readonly description: string;
  readonly handles: PlotSpec['handles'];
}

/** What React shows around the canvas; it renders again only when this changes, not at every drawing. */
function chromeOf(spec: PlotSpec): Chrome {
  const key = JSON.stringify([
    spec.legend,
    spec.notes,
    spec.empty,
    spec.title,
    spec.description,
    spec.handles.map((one) => [one.id, one.label, one.colour]),
  ]);
  const { legend, notes, empty, title, description, handles } = spec;
  return { key, legend, notes, empty, title, description, handles };
}

/** Width of a ring, in pixels. */
const RING = 13;

export function PlotFrame({ build, axes, onMoveHandle, onDrawn }: PlotFrameProps) {
  const store = useWorkbenchStore();
  const model = useShownModel();
  const stale = useWorkbench((state) => state.stale);
  const theme = useTheme((state) => state.theme);
  const frame = useRef<HTMLDivElement>(null);
  const canvas = useRef<HTMLCanvasElement>(null);
  const readout = useRef<HTMLDivElement>(null);
  const live = useRef<HTMLDivElement>(null);
  const viewRef = useRef<PlotView | null>(null);
  const handleElements = useRef(new Map<string, HTMLElement>());
  const walked = useRef<Walk | null>(null);
  const [chrome, setChrome] = useState<Chrome | null>(null);
  const [dialog, setDialog] = useState<'export' | 'table' | null>(null);

  const showReading = useCallback((reading: Reading | null) => {
    const element = readout.current;
    if (!element) return;
    element.hidden = reading === null;
    if (!reading) return;
    element.textContent = reading.text;
    const width = frame.current?.clientWidth ?? 0;
    const left = Math.min(
      Math.max(4, reading.x + 12),
      Math.max(4, width - Math.min(280, element.offsetWidth) - 4),
    );
    element.style.transform = `translate(${left}px, ${Math.max(2, reading.y - 34)}px)`;
  }, []);

  useEffect(() => {
    if (!canvas.current || !frame.current) return;
    const placeHandles = (view: PlotView) => {
      const rings: { x: number; y: number }[] = [];
      for (const handle of view.spec?.handles ?? []) {
        const element = handleElements.current.get(handle.id);
        const layout = view.layout;
        if (!element || !layout) continue;
        const y = handle.shape === 'vertical' ? layout.top : layout.y(handle.y);
        const beneath = rings.filter((ring) => Math.hypot(ring.x - layout.x(handle.x), ring.y - y) < RING);
        // Rings at one place stand side by side, so that each can be taken hold of.
        const x = layout.x(handle.x) + RING * beneath.length;
        if (handle.shape === 'ring') rings.push({ x: layout.x(handle.x), y });
        const inside = x >= layout.left - 6 && x <= layout.left + layout.innerWidth + 6;
        const insideY =
          handle.shape === 'vertical' || (y >= layout.top - 8 && y <= layout.top + layout.innerHeight + 8);
        element.style.visibility = inside && insideY ? 'visible' : 'hidden';
        element.style.transform = `translate(${x}px, ${y}px)`;
        if (handle.shape === 'vertical') {
          element.style.height = `${layout.innerHeight}px`;
          const value = element.querySelector('[data-value]');
          if (value) value.textContent = formatShort(handle.x, 4);
        }
      }
    };
    const view = new PlotView(
      canvas.current,
      () => {
        const palette = PALETTES[theme];
        return { spec: build({ state: store.getState(), model, palette, axes }), palette };
      },
      (drawn) => {
        placeHandles(drawn);
        onDrawn?.(drawn);
        if (!drawn.spec) return;
        const next = chromeOf(drawn.spec);
        setChrome((before) => (before?.key === next.key ? before : next));
      },
    );
    view.viewport = viewRef.current?.viewport ?? null;
    viewRef.current = view;
    const observer = new ResizeObserver(([entry]) => {
      if (entry) view.resize(Math.floor(entry.contentRect.width), Math.floor(entry.contentRect.height));
    });
    observer.observe(frame.current);
    const unsubscribe = watchPictures(store, 'handles', view.requestDraw);
    view.requestDraw();
    void document.fonts?.ready.then(view.requestDraw);
    return () => {
      observer.disconnect();
      unsubscribe();
      view.dispose();
    };
  }, [build, axes, model, theme, store, onDrawn]);

  // Handles that React has just made still have to be placed.
  useEffect(() => viewRef.current?.requestDraw(), [chrome]);

  const pointer = usePlotPointer(frame, viewRef, showReading);

  const getSource = useCallback((): ExportSource | null => {
    const spec = viewRef.current?.spec;
    if (!spec) return null;
    return {
      title: `${model.title}: ${spec.title}`,
      legend: spec.legend,
      notes: spec.notes,
      figure: (width, height) =>
        plotFigure(spec, layoutPlot(spec, width, height, viewRef.current?.viewport ?? null), PALETTES[theme]),
      tables: () => plotTables(spec),
    };
  }, [model, theme]);

  function handleKey(event: KeyboardEvent<HTMLDivElement>) {
    const view = viewRef.current;
    if (!view?.spec || !view.layout || event.target !== event.currentTarget) return;
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const { layout, spec } = view;
    const centre = [layout.left + layout.innerWidth / 2, layout.top + layout.innerHeight / 2] as const;
    if (event.key.startsWith('Arrow')) {
      const next = walk(spec, layout, walked.current, event.key);
      if (next) {
        walked.current = next.walk;
        showReading(next.reading);
        if (live.current) live.current.textContent = next.reading.text;
      }
    } else if (event.key === '+' || event.key === '=' || event.key === '-') {
      const zoomed = zoomedView(layout, ...centre, event.key === '-' ? 1.25 : 0.8);
      if (isSensible(zoomed)) view.setViewport(zoomed);
    } else if (event.key === '0') view.setViewport(null);
    else if (event.key.toLowerCase() === 't') setDialog('table');
    else if (event.key === 'Escape') showReading(null);
    else return;
    event.preventDefault();
    event.stopPropagation();
  }

  return (
    <div className="flex min-h-0 flex-1 flex-col">
      <div className={joinClasses('relative min-h-0 flex-1 transition-opacity', stale && 'opacity-50')}>
        <div
          ref={frame}
          role="application"
          aria-roledescription="plot"
          aria-label={chrome ? `${chrome.title}. ${chrome.description}` : 'Plot'}
          aria-description="Arrow keys walk through the points, plus and minus zoom, 0 resets, T shows a table of the numbers."
          tabIndex={0}
          className="absolute inset-0 overflow-hidden rounded-b-md"
          onKeyDown={handleKey}
          onBlur={() => showReading(null)}
          {...pointer}
        >
          <canvas ref={canvas} aria-hidden className="block" />
          <PlotHandles
            handles={chrome?.handles ?? []}
            getView={() => viewRef.current}
            onMove={onMoveHandle}
            register={(id, element) => {
              if (element) handleElements.current.set(id, element);
              else handleElements.current.delete(id);
            }}
          />
          <div
            ref={readout}
            hidden
            aria-hidden
            className="figures pointer-events-none absolute top-0 left-0 z-10 max-w-[280px] rounded border bg-raised px-2 py-1 text-xs shadow"
          />
        </div>
        {chrome?.empty ? (
          <div className="absolute inset-0 grid place-items-center rounded-md bg-raised p-6 text-center">
            <p className="max-w-sm text-muted">{chrome.empty}</p>
          </div>
        ) : null}
        <div ref={live} role="status" aria-live="polite" className="sr-only" />
      </div>
      <div className="flex items-start justify-between gap-2 px-3 pb-2">
        <div className="grid min-w-0 gap-0.5">
          <PlotLegend items={chrome?.empty ? [] : (chrome?.legend ?? [])} />
          {chrome?.notes.map((note) => (
            <p key={note} className="text-xs text-muted">
              {note}
            </p>
          ))}
        </div>
        <div className="flex shrink-0 gap-0.5">
          <IconButton label="Show the numbers as a table" onClick={() => setDialog('table')}>
            <Table2 size={16} aria-hidden />
          </IconButton>
          <IconButton label="Export this plot" onClick={() => setDialog('export')}>
            <Download size={16} aria-hidden />
          </IconButton>
        </div>
      </div>
      <TableDialog
        open={dialog === 'table'}
        onOpenChange={(open) => setDialog(open ? 'table' : null)}
        getSource={getSource}
      />
      <ExportDialog
        open={dialog === 'export'}
        onOpenChange={(open) => setDialog(open ? 'export' : null)}
        getSource={getSource}
      />
    </div>
  );
}

function IconButton({
  label,
  onClick,
  children,
}: {
  readonly label: string;
  readonly onClick: () => void;
  readonly children: React.ReactNode;
}) {
  return (
    <button
      type="button"
      aria-label={label}
      title={label}
      className="rounded p-1 text-muted hover:bg-panel hover:text-ink"
      onClick={onClick}
    >
      {children}
    </button>
  );
}
