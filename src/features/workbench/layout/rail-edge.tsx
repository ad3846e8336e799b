import { useState, type PointerEvent } from 'react';

const LIMITS = { narrowest: 300, widest: 640, start: 372, step: 16 } as const;
const STORAGE_KEY = 'moiety.rail-width';

function clamp(width: number): number {
  return Math.min(LIMITS.widest, Math.max(LIMITS.narrowest, Math.round(width)));
}

/** Width of the model rail in pixels; kept in this browser. */
export function useRailWidth(): readonly [number, (width: number) => void] {
  const [width, setWidth] = useState(() => {
    try {
      const stored = Number(localStorage.getItem(STORAGE_KEY));
      return stored > 0 ? clamp(stored) : LIMITS.start;
    } catch {
      return LIMITS.start;
    }
  });
  const change = (next: number) => {
    const clamped = clamp(next);
    setWidth(clamped);
    try {
      localStorage.setItem(STORAGE_KEY, String(clamped));
    } catch {
      // The width then lasts for this page only.
    }
  };
  return [width, change];
}

/** The edge of the model rail, dragged or moved by arrow keys. */
export function RailEdge({
  width,
  onChange,
}: {
  readonly width: number;
  readonly onChange: (width: number) => void;
}) {
  const handleMove = (event: PointerEvent<HTMLDivElement>) => {
    if (event.currentTarget.hasPointerCapture(event.pointerId)) onChange(event.clientX);
  };
  return (
    <div
      role="separator"
      aria-orientation="vertical"
      aria-label="Width of the model rail"
      aria-valuenow={width}
      aria-valuemin={LIMITS.narrowest}
      aria-valuemax={LIMITS.widest}
      tabIndex={0}
      className="relative z-10 w-px shrink-0 cursor-col-resize touch-none bg-hairline before:absolute before:inset-y-0 before:-left-1 before:w-2.5 hover:bg-accent focus-visible:bg-accent"
      onPointerDown={(event) => event.currentTarget.setPointerCapture(event.pointerId)}
      onPointerMove={handleMove}
      onKeyDown={(event) => {
        if (event.key === 'ArrowLeft') onChange(width - LIMITS.step);
        else if (event.key === 'ArrowRight') onChange(width + LIMITS.step);
        else return;
        event.preventDefault();
      }}
    />
  );
}
