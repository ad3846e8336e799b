import { drawFigure } from '@/graphics/canvas-renderer';
import { plotFigure } from '@/graphics/plot-figure';
import { layoutPlot, type PlotLayout } from '@/graphics/plot-layout';
import type { Palette } from '@/graphics/palette';
import type { PlotSpec, Viewport } from '@/graphics/plot-spec';

/** Draws one plot on its canvas, outside React: at most once a frame, whatever asks for it. */
export class PlotView {
  spec: PlotSpec | null = null;
  layout: PlotLayout | null = null;
  viewport: Viewport | null = null;
  private width = 0;
  private height = 0;
  private frame = 0;

  constructor(
    private readonly canvas: HTMLCanvasElement,
    private readonly build: () => { readonly spec: PlotSpec; readonly palette: Palette },
    private readonly onDrawn: (view: PlotView) => void,
  ) {}

  resize(width: number, height: number): void {
    if (width === this.width && height === this.height) return;
    this.width = width;
    this.height = height;
    const ratio = window.devicePixelRatio || 1;
    this.canvas.width = Math.round(width * ratio);
    this.canvas.height = Math.round(height * ratio);
    this.canvas.style.width = `${width}px`;
    this.canvas.style.height = `${height}px`;
    this.draw();
  }

  readonly requestDraw = (): void => {
    if (this.frame !== 0) return;
    this.frame = requestAnimationFrame(() => {
      this.frame = 0;
      this.draw();
    });
  };

  setViewport(viewport: Viewport | null): void {
    this.viewport = viewport;
    this.requestDraw();
  }

  dispose(): void {
    cancelAnimationFrame(this.frame);
  }

  private draw(): void {
    if (this.width < 40 || this.height < 40) return;
    const began = performance.now();
    const { spec, palette } = this.build();
    this.spec = spec;
    this.layout = layoutPlot(spec, this.width, this.height, this.viewport);
    const context = this.canvas.getContext('2d');
    if (context) {
      const ratio = window.devicePixelRatio || 1;
      context.setTransform(ratio, 0, 0, ratio, 0, 0);
      drawFigure(context, plotFigure(spec, this.layout, palette));
    }
    this.onDrawn(this);
    performance.measure('moiety:plot-drawn', { start: began, end: performance.now() });
  }
}
