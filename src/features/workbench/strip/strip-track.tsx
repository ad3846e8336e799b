import { useEffect, useRef, useState, type KeyboardEvent, type PointerEvent } from 'react';

import { formatShort } from '@/graphics/numbers';
import { parameterName } from '@/graphics/quantities';
import { joinClasses } from '@/lib/join-classes';

import { markedPoints } from '../cycles/marked-points';
import { readParameterValue, withParameterValue } from '../engine/parameter-values';
import { moveToPoint } from '../panes/move-to-point';
import { useShownModel } from '../panes/use-shown-model';
import { showsTwin } from '../panes/views/view-input';
import { useWorkbench, useWorkbenchStore, type SweepSelection } from '../state/store';
import { placeTicks } from './strip-ticks';

const SMALL_STEPS = 200;
const KEYS: Readonly<Record<string, number>> = {
  ArrowLeft: -1,
  ArrowDown: -1,
  ArrowRight: 1,
  ArrowUp: 1,
  PageDown: -10,
  PageUp: 10,
};

const NAME_SIDES = { start: '-translate-x-1', middle: '-translate-x-1/2', end: '-translate-x-full' } as const;

function useWidth() {
  const element = useRef<HTMLDivElement>(null);
  const [width, setWidth] = useState(600);
  useEffect(() => {
    if (!element.current) return;
    const observer = new ResizeObserver(([entry]) => entry && setWidth(entry.contentRect.width));
    observer.observe(element.current);
    return () => observer.disconnect();
  }, []);
  return [element, width] as const;
}

function Ticks({ selection, width }: { readonly selection: SweepSelection; readonly width: number }) {
  const store = useWorkbenchStore();
  const sweep = useWorkbench((state) => state.sweep);
  const cycles = useWorkbench((state) => state.cycles);
  const withTwin = useWorkbench(showsTwin);
  if (!sweep || sweep.split.parameterKey !== selection.parameter) return null;
  const points = [
    ...markedPoints(sweep.split, cycles?.split).map((point) => ({ point, twin: false })),
    ...(withTwin ? markedPoints(sweep.twin, cycles?.twin) : []).map((point) => ({ point, twin: true })),
  ];
  return placeTicks(points, selection.from, selection.to, width).map(({ point, twin, at, row, side }) => (
    <span
      key={`${twin ? 'twin' : 'own'}${point.id}`}
      className="absolute top-0"
      style={{ left: `${at * 100}%` }}
    >
      <span
        aria-hidden
        className={joinClasses('absolute top-8 -ml-px h-5 w-0.5', twin ? 'bg-twin' : 'bg-ink')}
      />
      {twin ? (
        row === null ? null : (
          <span
            className={joinClasses(
              'absolute text-xs whitespace-nowrap text-muted',
              NAME_SIDES[side],
              row === 0 ? 'top-4' : 'top-0',
            )}
          >
            {point.kind}, twin
          </span>
        )
      ) : (
        <button
          type="button"
          aria-label={`Go to ${point.kind} at ${formatShort(point.parameter, 5)}`}
          title={`${point.kind} at ${formatShort(point.parameter, 5)}. ${point.meaning}`}
          className={joinClasses(
            'absolute rounded text-xs font-medium whitespace-nowrap hover:underline',
            NAME_SIDES[row === null ? 'middle' : side],
            row === null ? 'top-8 h-5 w-3' : row === 0 ? 'top-4' : 'top-0',
          )}
          onClick={() => moveToPoint(store, point)}
        >
          {row === null ? '' : point.kind}
        </button>
      )}
    </span>
  ));
}

/** The swept parameter as a strip: a tick at every special point, and a handle that moves every pane live. */
export function StripTrack({ selection }: { readonly selection: SweepSelection }) {
  const store = useWorkbenchStore();
  const model = useShownModel();
  const [track, width] = useWidth();
  const value = useWorkbench((state) => readParameterValue(state.document, selection.parameter));
  const { from, to, parameter } = selection;
  const named = parameterName(model, parameter);
  const at = value === null ? 0 : Math.min(1, Math.max(0, (value - from) / (to - from)));
  const outside = value !== null && (value < from || value > to);

  function moveTo(next: number) {
    const bounded = Number(Math.min(to, Math.max(from, next)).toPrecision(6));
    store
      .getState()
      .edit(
        `Move ${parameter}`,
        (document) => withParameterValue(document, parameter, bounded),
        `strip:${parameter}`,
      );
    if (store.getState().selectedPoint) store.getState().set({ selectedPoint: null });
  }

  function handlePointer(event: PointerEvent<HTMLDivElement>) {
    if (event.target instanceof Element && event.target.closest('button')) return;
    if (event.type === 'pointerdown') event.currentTarget.setPointerCapture(event.pointerId);
    else if (!event.currentTarget.hasPointerCapture(event.pointerId)) return;
    const box = event.currentTarget.getBoundingClientRect();
    if (box.width > 0) moveTo(from + ((event.clientX - box.left) / box.width) * (to - from));
  }

  function handleKey(event: KeyboardEvent<HTMLDivElement>) {
    if (value === null) return;
    const step = KEYS[event.key];
    if (event.key === 'Home') moveTo(from);
    else if (event.key === 'End') moveTo(to);
    else if (step !== undefined)
      moveTo(value + ((to - from) / SMALL_STEPS) * step * (event.shiftKey ? 10 : 1));
    else return;
    event.preventDefault();
  }

  return (
    <div
      ref={track}
      className="relative h-16 min-w-0 flex-1 touch-none select-none"
      onPointerDown={handlePointer}
      onPointerMove={handlePointer}
    >
      <div aria-hidden className="absolute inset-x-0 top-10 h-1 rounded-full bg-hairline" />
      <div
        aria-hidden
        className="absolute top-10 left-0 h-1 rounded-full bg-accent"
        style={{ width: `${at * 100}%` }}
      />
      <Ticks selection={selection} width={width} />
      <div
        role="slider"
        tabIndex={0}
        aria-label={named.name}
        aria-valuemin={from}
        aria-valuemax={to}
        aria-valuenow={value ?? from}
        aria-valuetext={`${formatShort(value ?? NaN, 5)}${named.unit ? ` ${named.unit}` : ''}${outside ? ', outside the strip' : ''}`}
        className="absolute top-[33px] -ml-2 size-4 cursor-ew-resize rounded-full border-2 border-raised bg-accent shadow"
        style={{ left: `${at * 100}%` }}
        onKeyDown={handleKey}
      />
      <span
        aria-hidden
        className="figures pointer-events-none absolute top-[50px] -translate-x-1/2 text-xs font-semibold text-accent"
        style={{ left: `${Math.min(0.97, Math.max(0.03, at)) * 100}%` }}
      >
        {value === null ? '' : formatShort(value, 4)}
      </span>
    </div>
  );
}
