import { OrbitControls } from '@react-three/drei';
import { Canvas, useFrame, useThree } from '@react-three/fiber';
import { useCallback, useEffect, useMemo, useState } from 'react';
import type { Camera, WebGLRenderer, WebGLRendererParameters } from 'three';

import type { Palette } from '@/graphics/palette';

import { CAMERA_PRESETS } from './camera-presets';
import { SceneLines } from './scene-lines';
import type { SceneLink } from './scene-link';
import type { SpaceSpec } from './space-spec';
import { createRenderer, webglKind } from './webgl';

interface SceneProps {
  readonly build: () => { readonly spec: SpaceSpec; readonly palette: Palette };
  readonly watch: (notify: () => void) => () => void;
  readonly link: SceneLink;
  /** Called after each frame, to draw what stands above the scene. */
  readonly onFrame: (camera: Camera, spec: SpaceSpec) => void;
  /** Called where the browser turns out to offer no WebGL. */
  readonly onMissing: () => void;
}

function Lines({ build, watch, link, onFrame }: Omit<SceneProps, 'onMissing'>) {
  const invalidate = useThree((state) => state.invalidate);
  const camera = useThree((state) => state.camera);
  const size = useThree((state) => state.size);
  const lines = useMemo(() => new SceneLines(webglKind() === 'software' ? 2 : 3), []);
  useEffect(() => () => lines.dispose(), [lines]);
  useEffect(() => {
    lines.size.set(size.width, size.height);
    invalidate();
  }, [lines, size, invalidate]);
  useEffect(() => {
    link.attach(camera, () => invalidate());
    invalidate();
    return watch(() => invalidate());
  }, [watch, invalidate, camera, link]);
  useFrame(() => {
    const began = performance.now();
    const { spec, palette } = build();
    lines.update(spec, palette);
    onFrame(camera, spec);
    performance.measure('moiety:space-drawn', { start: began, end: performance.now() });
  });
  return <primitive object={lines.group} />;
}

function Controls({ link }: { readonly link: SceneLink }) {
  const invalidate = useThree((state) => state.invalidate);
  return (
    <OrbitControls
      makeDefault
      enableDamping={false}
      minDistance={0.5}
      maxDistance={20}
      onChange={() => invalidate()}
      ref={(controls) => {
        link.onCentre(() => {
          controls?.target.set(0, 0, 0);
          controls?.update();
        });
      }}
    />
  );
}

/** The live scene: drawn only when something changed. */
export function SpaceScene({ onMissing, ...scene }: SceneProps) {
  const [kind, setKind] = useState(webglKind);
  const begin = useCallback(
    async (defaults: WebGLRendererParameters): Promise<WebGLRenderer> => {
      const renderer = createRenderer({ ...defaults, antialias: true, alpha: true });
      setKind(webglKind());
      if (renderer) return renderer;
      onMissing();
      // The scene is taken away; nothing may draw on it meanwhile.
      return new Promise(() => undefined);
    },
    [onMissing],
  );
  return (
    <Canvas
      frameloop="demand"
      dpr={kind === 'hardware' ? [1, 2] : 1}
      gl={begin}
      camera={{ position: [...CAMERA_PRESETS.oblique.position], fov: 38, near: 0.05, far: 60 }}
      aria-hidden
    >
      <Controls link={scene.link} />
      <Lines {...scene} />
    </Canvas>
  );
}
