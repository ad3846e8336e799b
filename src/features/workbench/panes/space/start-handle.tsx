import { useEffect, useRef, type PointerEvent, type RefObject } from 'react';
import { Vector3, type Camera } from 'three';

import { withStart } from '../../engine/parameter-values';
import { useWorkbenchStore } from '../../state/store';
import { cubeProjector, cubeScale } from './project-space';
import type { SpaceSpec } from './space-spec';

interface StartHandleProps {
  readonly shownRef: RefObject<{ camera: Camera; spec: SpaceSpec } | null>;
  readonly placeRef: RefObject<(() => void) | null>;
}

/** Open ring at the start of the trajectory; dragging moves it in the plane that faces the viewer. */
export function StartHandle({ shownRef, placeRef }: StartHandleProps) {
  const store = useWorkbenchStore();
  const ring = useRef<HTMLButtonElement>(null);
  const dragging = useRef(false);

  useEffect(() => {
    placeRef.current = () => {
      const element = ring.current;
      const { camera, spec } = shownRef.current ?? {};
      const parent = element?.parentElement;
      if (!element || !camera || !spec?.start || !parent) return;
      const at = cubeScale(spec).toCube(...spec.start.at, new Vector3());
      const pixel = cubeProjector(camera, parent.clientWidth, parent.clientHeight)(at.x, at.y, at.z);
      element.style.transform = `translate(${pixel.x}px, ${pixel.y}px)`;
      element.style.visibility = Number.isFinite(pixel.x + pixel.y) ? 'visible' : 'hidden';
    };
    placeRef.current();
    return () => {
      placeRef.current = null;
    };
  }, [placeRef, shownRef]);

  function handleMove(event: PointerEvent<HTMLButtonElement>) {
    const { camera, spec } = shownRef.current ?? {};
    const box = event.currentTarget.parentElement?.getBoundingClientRect();
    if (!dragging.current || !camera || !spec?.start || !box) return;
    const cube = cubeScale(spec);
    const depth = cube.toCube(...spec.start.at, new Vector3()).project(camera).z;
    const target = new Vector3(
      ((event.clientX - box.left) / box.width) * 2 - 1,
      1 - ((event.clientY - box.top) / box.height) * 2,
      depth,
    ).unproject(camera);
    const values = [target.x, -target.z, target.y].map((at, k) =>
      Number((cube.axes[k]?.invert(Math.max(-1, Math.min(1.2, at))) ?? NaN).toPrecision(6)),
    );
    const { classes } = spec.start;
    store
      .getState()
      .edit(
        'Move the start',
        (document) =>
          classes.reduce((next, symbol, k) => withStart(next, symbol, values[k] ?? NaN), document),
        'start:space',
      );
  }

  return (
    <button
      ref={ring}
      type="button"
      tabIndex={-1}
      aria-label="Start of the trajectory. Drag it, or type start values in the model rail."
      className="absolute top-0 left-0 -mt-2.5 -ml-2.5 size-5 touch-none rounded-full p-1"
      onPointerDown={(event) => {
        event.stopPropagation();
        event.currentTarget.setPointerCapture(event.pointerId);
        dragging.current = true;
      }}
      onPointerMove={handleMove}
      onPointerUp={() => (dragging.current = false)}
      onPointerCancel={() => (dragging.current = false)}
    >
      <span className="block size-3 rounded-full border-2 border-ink bg-raised" />
    </button>
  );
}
