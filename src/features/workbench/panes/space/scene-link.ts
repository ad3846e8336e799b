import type { Camera } from 'three';

/** What the page holds of a scene that is drawn elsewhere: its camera, and how to have it drawn again. */
export class SceneLink {
  camera: Camera | null = null;
  private redraw: () => void = () => undefined;
  private centre: () => void = () => undefined;

  attach(camera: Camera, redraw: () => void): void {
    this.camera = camera;
    this.redraw = redraw;
  }

  onCentre(centre: () => void): void {
    this.centre = centre;
  }

  invalidate(): void {
    this.redraw();
  }

  /** Turns the view about the middle again after panning. */
  reset(): void {
    this.centre();
  }
}
