import { Spherical, Vector3, type Camera } from 'three';

interface Preset {
  readonly label: string;
  readonly position: readonly [number, number, number];
}

export const CAMERA_PRESETS = {
  oblique: { label: 'oblique', position: [1.8, 1.5, 4.4] },
  x: { label: 'along x', position: [4.9, 0, 0.001] },
  y: { label: 'along y', position: [0, 0, 4.9] },
  z: { label: 'along z', position: [0, 4.9, 0.001] },
} as const satisfies Record<string, Preset>;

export type CameraPreset = keyof typeof CAMERA_PRESETS;

export function presetPosition(preset: CameraPreset): readonly [number, number, number] {
  return CAMERA_PRESETS[preset].position;
}

/** Radians a press of an arrow key turns the camera by. */
const TURN = 0.09;
const POLE = 0.02;

/** Turns or moves the camera after a key; false where the key is not one of its own. */
export function moveCameraByKey(camera: Camera, key: string): boolean {
  const spherical = new Spherical().setFromVector3(camera.position);
  if (key === 'ArrowLeft') spherical.theta -= TURN;
  else if (key === 'ArrowRight') spherical.theta += TURN;
  else if (key === 'ArrowUp') spherical.phi -= TURN;
  else if (key === 'ArrowDown') spherical.phi += TURN;
  else if (key === '+' || key === '=') spherical.radius *= 0.9;
  else if (key === '-') spherical.radius *= 1.1;
  else return false;
  spherical.phi = Math.min(Math.PI - POLE, Math.max(POLE, spherical.phi));
  spherical.radius = Math.min(20, Math.max(0.5, spherical.radius));
  camera.position.setFromSpherical(spherical);
  camera.lookAt(new Vector3(0, 0, 0));
  camera.updateMatrixWorld();
  return true;
}
