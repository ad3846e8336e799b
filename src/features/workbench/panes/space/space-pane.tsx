import { Download, Table2 } from 'lucide-react';
import { useCallback, useEffect, useRef, useState, type KeyboardEvent } from 'react';
import { PerspectiveCamera, Vector3, type Camera } from 'three';

import type { Quantity } from '@/engine/schema/preset';
import { drawFigure } from '@/graphics/canvas-renderer';
import { PALETTES } from '@/graphics/palette';
import { joinClasses } from '@/lib/join-classes';
import { useTheme } from '@/lib/theme';

import { useWorkbench, useWorkbenchStore } from '../../state/store';
import { ExportDialog } from '../plot/export-dialog';
import type { ExportSource } from '../plot/export-source';
import { PlotLegend } from '../plot/plot-legend';
import { TableDialog } from '../plot/table-dialog';
import { useShownModel } from '../use-shown-model';
import { watchPictures } from '../watch-pictures';
import { CAMERA_PRESETS, moveCameraByKey, presetPosition, type CameraPreset } from './camera-presets';
import { projectSpace } from './project-space';
import { SceneLink } from './scene-link';
import { SpaceScene } from './space-scene';
import { spaceSpec, spaceTables, type SpaceSpec } from './space-spec';
import { StartHandle } from './start-handle';
import { webglKind } from './webgl';

interface SpacePaneProps {
  readonly view: 'space' | 'space-diagram';
  readonly axes: readonly Quantity[];
}

function obliqueCamera(width: number, height: number): PerspectiveCamera {
  const camera = new PerspectiveCamera(38, width / height, 0.05, 60);
  camera.position.set(...CAMERA_PRESETS.oblique.position);
  camera.lookAt(0, 0, 0);
  camera.updateMatrixWorld();
  return camera;
}

/** The live camera with the proportions of another picture. */
function cameraFor(camera: Camera | null, width: number, height: number): PerspectiveCamera {
  if (!(camera instanceof PerspectiveCamera)) return obliqueCamera(width, height);
  const copy = camera.clone();
  copy.aspect = width / height;
  copy.updateProjectionMatrix();
  copy.updateMatrixWorld();
  return copy;
}

const sameWords = (a: SpaceSpec, b: SpaceSpec) =>
  a.empty === b.empty &&
  a.description === b.description &&
  JSON.stringify([a.legend, a.notes]) === JSON.stringify([b.legend, b.notes]);

export default function SpacePane({ view, axes }: SpacePaneProps) {
  const store = useWorkbenchStore();
  const model = useShownModel();
  const stale = useWorkbench((state) => state.stale);
  const theme = useTheme((state) => state.theme);
  const palette = PALETTES[theme];
  const overlay = useRef<HTMLCanvasElement>(null);
  const [flat, setFlat] = useState(() => webglKind() === 'none');
  const [link] = useState(() => new SceneLink());
  const [words, setWords] = useState<SpaceSpec | null>(null);
  const [dialog, setDialog] = useState<'export' | 'table' | null>(null);
  const shown = useRef<{ camera: Camera; spec: SpaceSpec } | null>(null);
  const placeStart = useRef<(() => void) | null>(null);

  const build = useCallback(
    () => ({ spec: spaceSpec(view, { state: store.getState(), model, palette, axes }), palette }),
    [view, store, model, palette, axes],
  );
  const watch = useCallback((notify: () => void) => watchPictures(store, 'results', notify), [store]);

  const handleFrame = useCallback(
    (camera: Camera, spec: SpaceSpec) => {
      shown.current = { camera, spec };
      setWords((before) => (before && sameWords(before, spec) ? before : spec));
      const canvas = overlay.current;
      const context = canvas?.getContext('2d');
      if (!canvas || !context) return;
      const { clientWidth: width, clientHeight: height } = canvas;
      const ratio = window.devicePixelRatio || 1;
      if (canvas.width !== Math.round(width * ratio) || canvas.height !== Math.round(height * ratio)) {
        canvas.width = Math.round(width * ratio);
        canvas.height = Math.round(height * ratio);
      }
      camera.updateMatrixWorld();
      context.setTransform(ratio, 0, 0, ratio, 0, 0);
      drawFigure(context, projectSpace(spec, camera, { width, height }, palette, flat ? 'all' : 'signs'));
      placeStart.current?.();
    },
    [palette, flat],
  );

  const handleMissing = useCallback(() => setFlat(true), []);

  useEffect(() => link.invalidate(), [build, link]);

  // Without WebGL the same space is drawn flat, seen obliquely.
  useEffect(() => {
    if (!flat || !overlay.current) return;
    const canvas = overlay.current;
    const draw = () => {
      handleFrame(cameraFor(link.camera, canvas.clientWidth || 1, canvas.clientHeight || 1), build().spec);
    };
    link.attach(link.camera ?? obliqueCamera(1, 1), draw);
    draw();
    const observer = new ResizeObserver(draw);
    observer.observe(canvas);
    const unsubscribe = watchPictures(store, 'results', draw);
    return () => {
      observer.disconnect();
      unsubscribe();
    };
  }, [flat, build, handleFrame, link, store]);

  const getSource = useCallback((): ExportSource | null => {
    const spec = shown.current?.spec;
    if (!spec) return null;
    return {
      title: `${model.title}: ${spec.title}`,
      legend: spec.legend,
      notes: spec.notes,
      figure: (width, height) =>
        projectSpace(spec, cameraFor(link.camera, width, height), { width, height }, palette, 'all'),
      tables: () => spaceTables(spec),
    };
  }, [model, palette, link]);

  function look(preset: CameraPreset) {
    if (!link.camera) return;
    link.camera.position.set(...presetPosition(preset));
    link.reset();
    link.camera.lookAt(new Vector3(0, 0, 0));
    link.camera.updateMatrixWorld();
    link.invalidate();
  }

  function handleKey(event: KeyboardEvent<HTMLDivElement>) {
    if (event.target !== event.currentTarget || event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.key === '0') look('oblique');
    else if (event.key.toLowerCase() === 't') setDialog('table');
    else if (link.camera && moveCameraByKey(link.camera, event.key)) link.invalidate();
    else return;
    event.preventDefault();
    event.stopPropagation();
  }

  const names = ['x', 'y', 'z'] as const;
  return (
    <div className="flex min-h-0 flex-1 flex-col">
      <div
        role="application"
        aria-roledescription="space"
        aria-label={words ? `${words.title}. ${words.description}` : 'Space'}
        aria-description="Arrow keys turn the view, plus and minus move it, 0 resets, T shows a table of the numbers."
        tabIndex={0}
        className={joinClasses('relative min-h-0 flex-1 rounded transition-opacity', stale && 'opacity-50')}
        onKeyDown={handleKey}
        onDoubleClick={() => look('oblique')}
      >
        {flat ? null : (
          <div className="absolute inset-0">
            <SpaceScene
              build={build}
              watch={watch}
              link={link}
              onFrame={handleFrame}
              onMissing={handleMissing}
            />
          </div>
        )}
        <canvas ref={overlay} aria-hidden className="pointer-events-none absolute inset-0 h-full w-full" />
        {words?.start ? <StartHandle shownRef={shown} placeRef={placeStart} /> : null}
        {words?.empty ? (
          <div className="absolute inset-0 grid place-items-center rounded-md bg-raised p-6 text-center">
            <p className="max-w-sm text-muted">{words.empty}</p>
          </div>
        ) : null}
      </div>
      <div className="flex items-start justify-between gap-2 px-3 pb-2">
        <div className="grid min-w-0 gap-0.5">
          <PlotLegend items={words?.empty ? [] : (words?.legend ?? [])} />
          {flat ? (
            <p className="text-xs text-muted">
              This browser offers no WebGL, so the space is drawn flat; the arrow keys still turn it.
            </p>
          ) : null}
          {words?.notes.map((note) => (
            <p key={note} className="text-xs text-muted">
              {note}
            </p>
          ))}
        </div>
        <div className="flex shrink-0 items-center gap-0.5 text-sm">
          <button
            type="button"
            className="rounded px-1 text-muted hover:bg-panel hover:text-ink"
            onClick={() => look('oblique')}
          >
            oblique
          </button>
          {names.map((name) => (
            <button
              key={name}
              type="button"
              aria-label={`Look along ${name}`}
              className="rounded px-1.5 text-muted hover:bg-panel hover:text-ink"
              onClick={() => look(name)}
            >
              {name}
            </button>
          ))}
          <button
            type="button"
            aria-label="Show the numbers as a table"
            title="Show the numbers as a table"
            className="rounded p-1 text-muted hover:bg-panel hover:text-ink"
            onClick={() => setDialog('table')}
          >
            <Table2 size={16} aria-hidden />
          </button>
          <button
            type="button"
            aria-label="Export this plot"
            title="Export this plot"
            className="rounded p-1 text-muted hover:bg-panel hover:text-ink"
            onClick={() => setDialog('export')}
          >
            <Download size={16} aria-hidden />
          </button>
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
