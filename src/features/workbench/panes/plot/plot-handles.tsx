import { useRef, type KeyboardEvent, type PointerEvent } from 'react';

import type { PlotHandle } from '@/graphics/plot-spec';

import type { PlotView } from './plot-view';

interface PlotHandlesProps {
  readonly handles: readonly Pick<PlotHandle, 'id' | 'label' | 'shape' | 'moves' | 'colour'>[];
  readonly getView: () => PlotView | null;
  readonly onMove: (id: string, x: number, y: number) => void;
  /** Elements are placed by the view after each drawing, not by React. */
  readonly register: (id: string, element: HTMLElement | null) => void;
}

const KEY_STEPS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};
/** Pixels a press of an arrow key moves a handle; with Shift, ten times as many. */
const KEY_PIXELS = 2;

/** Rings and lines to drag; arrow keys move the one in focus. */
export function PlotHandles({ handles, getView, onMove, register }: PlotHandlesProps) {
  const dragged = useRef<string | null>(null);

  function moveTo(handle: PlotHandlesProps['handles'][number], px: number, py: number) {
    const layout = getView()?.layout;
    const current = getView()?.spec?.handles.find((one) => one.id === handle.id);
    if (!layout || !current) return;
    const x = handle.moves === 'y' ? current.x : layout.x.invert(px);
    const y = handle.moves === 'x' ? current.y : layout.y.invert(py);
    onMove(handle.id, x, y);
  }

  function handlePointer(handle: PlotHandlesProps['handles'][number], event: PointerEvent<HTMLElement>) {
    if (event.type === 'pointerdown') {
      event.preventDefault();
      event.stopPropagation();
      event.currentTarget.focus();
      event.currentTarget.setPointerCapture(event.pointerId);
      dragged.current = handle.id;
    } else if (event.type === 'pointermove' && dragged.current === handle.id) {
      const frame = event.currentTarget.parentElement?.getBoundingClientRect();
      if (frame) moveTo(handle, event.clientX - frame.left, event.clientY - frame.top);
    } else if (event.type !== 'pointermove') dragged.current = null;
  }

  function handleKey(handle: PlotHandlesProps['handles'][number], event: KeyboardEvent<HTMLElement>) {
    const step = KEY_STEPS[event.key];
    const view = getView();
    const current = view?.spec?.handles.find((one) => one.id === handle.id);
    if (!step || !view?.layout || !current) return;
    event.preventDefault();
    event.stopPropagation();
    const pixels = event.shiftKey ? KEY_PIXELS * 10 : KEY_PIXELS;
    moveTo(handle, view.layout.x(current.x) + step[0] * pixels, view.layout.y(current.y) + step[1] * pixels);
  }

  return handles.map((handle) => (
    <button
      key={handle.id}
      ref={(element) => register(handle.id, element)}
      type="button"
      data-handle={handle.id}
      aria-label={`${handle.label}. Drag, or use the arrow keys.`}
      className={
        handle.shape === 'ring'
          ? 'absolute top-0 left-0 -mt-2.5 -ml-2.5 size-5 touch-none rounded-full p-1'
          : 'group absolute top-0 left-0 -ml-2 w-4 cursor-ew-resize touch-none'
      }
      onPointerDown={(event) => handlePointer(handle, event)}
      onPointerMove={(event) => handlePointer(handle, event)}
      onPointerUp={(event) => handlePointer(handle, event)}
      onPointerCancel={(event) => handlePointer(handle, event)}
      onKeyDown={(event) => handleKey(handle, event)}
    >
      {handle.shape === 'ring' ? (
        <span
          className="block size-3 rounded-full border-2 bg-raised"
          style={{ borderColor: handle.colour }}
        />
      ) : (
        <>
          <span className="absolute inset-y-0 left-[7px] w-0.5 bg-accent" />
          <span
            data-value
            className="figures absolute top-0 left-1/2 -translate-x-1/2 rounded-full bg-accent px-2 py-0.5 text-xs font-semibold text-accent-ink"
          />
        </>
      )}
    </button>
  ));
}
