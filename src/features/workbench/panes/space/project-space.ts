import { Vector3, type Camera } from 'three';

import { axisLabel, axisTicks, createScale, type AxisScale } from '@/graphics/axis';
import type { Figure, Mark, TextMark } from '@/graphics/marks';
import type { Palette } from '@/graphics/palette';
import { nameMarks, type NamedMark } from '@/graphics/point-names';

import type { SpaceSpec } from './space-spec';

export type Point3 = readonly [number, number, number];

/** From data units to the cube from −1 to 1: x to the right, the second axis into depth, the third up. */
export interface CubeScale {
  readonly axes: readonly [AxisScale, AxisScale, AxisScale];
  toCube(x: number, y: number, z: number, out: Vector3): Vector3;
}

export function cubeScale(spec: SpaceSpec): CubeScale {
  const [x, y, z] = spec.axes;
  const axes = [createScale(x, [-1, 1]), createScale(y, [-1, 1]), createScale(z, [-1, 1])] as const;
  return { axes, toCube: (a, b, c, out) => out.set(axes[0](a), axes[2](c), -axes[1](b)) };
}

export interface Projector {
  (x: number, y: number, z: number): { readonly x: number; readonly y: number; readonly depth: number };
}

/** From the cube to pixels. */
export function cubeProjector(camera: Camera, width: number, height: number): Projector {
  const point = new Vector3();
  return (x, y, z) => {
    point.set(x, y, z).project(camera);
    return { x: ((point.x + 1) / 2) * width, y: ((1 - point.y) / 2) * height, depth: point.z };
  };
}

const TICKS = 4;

interface AxisEdge {
  readonly at: (value: number) => Point3;
  /** Direction away from the cube, towards which labels stand. */
  readonly out: Point3;
}

/** Edges of the cube along which the three axes are written. */
const EDGES: readonly AxisEdge[] = [
  { at: (s) => [s, -1, 1], out: [0, -0.09, 0.09] },
  { at: (s) => [1, -1, -s], out: [0.12, -0.07, 0] },
  { at: (s) => [-1, s, 1], out: [-0.12, 0, 0.05] },
];

/** Floor grid at the ticks and the three edges, as pairs of points in the cube. */
export function frameSegments(
  spec: SpaceSpec,
  cube: CubeScale,
): { readonly grid: number[]; readonly edges: number[] } {
  const grid: number[] = [];
  for (const tick of axisTicks(spec.axes[0], TICKS)) {
    const s = cube.axes[0](tick.value);
    grid.push(s, -1, -1, s, -1, 1);
  }
  for (const tick of axisTicks(spec.axes[1], TICKS)) {
    const s = -cube.axes[1](tick.value);
    grid.push(-1, -1, s, 1, -1, s);
  }
  grid.push(
    -1,
    -1,
    -1,
    1,
    -1,
    -1,
    -1,
    -1,
    -1,
    -1,
    1,
    -1,
    1,
    -1,
    -1,
    1,
    1,
    -1,
    -1,
    1,
    -1,
    1,
    1,
    -1,
    -1,
    1,
    -1,
    -1,
    1,
    1,
  );
  const edges = EDGES.flatMap((edge) => [...edge.at(-1), ...edge.at(1)]);
  return { grid, edges };
}

/** Half the width of a text of that many letters, in pixels. */
const HALF_LETTER = 3.3;

function axisTexts(
  spec: SpaceSpec,
  cube: CubeScale,
  project: Projector,
  palette: Palette,
  { width, height }: { readonly width: number; readonly height: number },
): TextMark[] {
  return EDGES.flatMap((edge, k): TextMark[] => {
    const axis = spec.axes[k];
    const scale = cube.axes[k];
    if (!axis || !scale) return [];
    const text = (s: number, away: number, words: string, more: Partial<TextMark>): TextMark => {
      const [x, y, z] = edge.at(s);
      const half = words.length * HALF_LETTER + 4;
      const at = project(x + edge.out[0] * away, y + edge.out[1] * away, z + edge.out[2] * away);
      return {
        kind: 'text',
        x:
          more.anchor === 'start'
            ? Math.min(width - 2 * half, at.x)
            : Math.max(half, Math.min(width - half, at.x)),
        y: Math.max(9, Math.min(height - 9, at.y)),
        text: words,
        size: 11.5,
        colour: palette.muted,
        anchor: 'middle',
        baseline: 'middle',
        family: 'text',
        halo: palette.raised,
        ...more,
      };
    };
    return [
      ...axisTicks(axis, TICKS).map((tick) => text(scale(tick.value), 1, tick.label, {})),
      text(k === 2 ? 1.14 : 0, k === 2 ? 0.2 : 3.3, axisLabel(axis), {
        size: 13,
        colour: palette.ink,
        ...(k === 1 ? { anchor: 'start' } : {}),
      }),
    ];
  });
}

function strokes(points: readonly number[], project: Projector, stroke: string): Mark {
  const segments = new Float64Array((points.length / 3) * 2);
  for (let k = 0; 3 * k + 2 < points.length; k++) {
    const at = project(points[3 * k] ?? 0, points[3 * k + 1] ?? 0, points[3 * k + 2] ?? 0);
    segments[2 * k] = at.x;
    segments[2 * k + 1] = at.y;
  }
  return { kind: 'strokes', segments, stroke, width: 1 };
}

/** The space as seen by a camera: all of it for an export, names and signs alone above the live scene. */
export function projectSpace(
  spec: SpaceSpec,
  camera: Camera,
  size: { readonly width: number; readonly height: number },
  palette: Palette,
  parts: 'all' | 'signs',
): Figure {
  const cube = cubeScale(spec);
  const project = cubeProjector(camera, size.width, size.height);
  const point = new Vector3();
  const marks: Mark[] = [];
  if (parts === 'all') {
    const frame = frameSegments(spec, cube);
    marks.push(
      { kind: 'rect', x: 0, y: 0, ...size, fill: palette.raised },
      strokes(frame.grid, project, palette.hairline),
      strokes(frame.edges, project, palette.muted),
    );
    for (const line of spec.lines) {
      const points = new Float64Array((line.points.length / 3) * 2);
      for (let k = 0; 3 * k < line.points.length; k++) {
        cube.toCube(
          line.points[3 * k] ?? NaN,
          line.points[3 * k + 1] ?? NaN,
          line.points[3 * k + 2] ?? NaN,
          point,
        );
        const at = project(point.x, point.y, point.z);
        points[2 * k] = at.x;
        points[2 * k + 1] = at.y;
      }
      marks.push({
        kind: 'path',
        points,
        stroke: line.colour,
        width: line.twin ? 1.4 : 1.8,
        opacity: line.opacity,
        ...(line.dashed ? { dash: [5, 4] } : {}),
      });
    }
  }
  marks.push(...axisTexts(spec, cube, project, palette, size));
  const names: NamedMark[] = [];
  for (const one of spec.points) {
    cube.toCube(...one.at, point);
    if (Math.max(Math.abs(point.x), Math.abs(point.y), Math.abs(point.z)) > 1.02) continue;
    const at = project(point.x, point.y, point.z);
    if (!Number.isFinite(at.x) || !Number.isFinite(at.y)) continue;
    marks.push({
      kind: 'glyph',
      glyph: one.glyph,
      x: at.x,
      y: at.y,
      size: one.size,
      colour: one.colour,
      ground: palette.raised,
    });
    names.push({ x: at.x, y: at.y, size: one.size, label: one.label, named: one.named, twin: one.twin });
  }
  const window = { x0: 0, x1: size.width, y0: 0, y1: size.height };
  marks.push(...nameMarks(names, window, palette));
  return { ...size, title: spec.title, description: spec.description, marks };
}
