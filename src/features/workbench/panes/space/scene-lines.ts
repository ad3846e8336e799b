import {
  BufferAttribute,
  BufferGeometry,
  DynamicDrawUsage,
  Group,
  Line,
  LineBasicMaterial,
  LineDashedMaterial,
  LineSegments,
  Vector2,
  Vector3,
} from 'three';

import type { Palette } from '@/graphics/palette';

import { cubeScale, frameSegments } from './project-space';
import type { SpaceSpec } from './space-spec';

/** Thin lines are one pixel wide in WebGL; drawn again a little aside they look as wide as in the flat plots. */
const ASIDE: readonly (readonly [number, number])[] = [
  [0, 0],
  [0.8, 0],
  [0, 0.8],
];
const CAPACITY_STEP = 1024;

function asideMaterial(
  colour: string,
  dashed: boolean,
  opacity: number,
  aside: readonly [number, number],
  size: Vector2,
) {
  const options = { color: colour, transparent: opacity < 1, opacity };
  const material = dashed
    ? new LineDashedMaterial({ ...options, dashSize: 0.045, gapSize: 0.035 })
    : new LineBasicMaterial(options);
  const shift = new Vector2(...aside);
  material.onBeforeCompile = (shader) => {
    shader.uniforms['aside'] = { value: shift };
    shader.uniforms['size'] = { value: size };
    shader.vertexShader = `uniform vec2 aside;\nuniform vec2 size;\n${shader.vertexShader}`.replace(
      '#include <project_vertex>',
      '#include <project_vertex>\ngl_Position.xy += 2.0 * aside / size * gl_Position.w;',
    );
  };
  return material;
}

interface LiveLine {
  readonly geometry: BufferGeometry;
  readonly strands: readonly Line[];
  readonly look: string;
  capacity: number;
}

/** The lines of a space as three objects: buffers are updated in place, and grow when they must. */
export class SceneLines {
  readonly group = new Group();
  readonly size = new Vector2(1, 1);
  private readonly lines = new Map<string, LiveLine>();
  private readonly grid = new LineSegments(new BufferGeometry(), new LineBasicMaterial());
  private readonly edges = new LineSegments(new BufferGeometry(), new LineBasicMaterial());
  private readonly point = new Vector3();

  /** @param strands how often each line is drawn, a little aside each time */
  constructor(private readonly strands: number) {
    this.group.add(this.grid, this.edges);
  }

  update(spec: SpaceSpec, palette: Palette): void {
    const cube = cubeScale(spec);
    const frame = frameSegments(spec, cube);
    setSegments(this.grid, frame.grid, palette.hairline);
    setSegments(this.edges, frame.edges, palette.muted);
    const present = new Set<string>();
    for (const line of spec.lines) {
      present.add(line.id);
      const live = this.ensure(
        line.id,
        line.colour,
        line.dashed,
        line.opacity,
        line.twin,
        line.points.length / 3,
      );
      const attribute = live.geometry.getAttribute('position') as BufferAttribute;
      const array = attribute.array as Float32Array;
      let filled = 0;
      for (let k = 0; k + 2 < line.points.length; k += 3) {
        cube.toCube(line.points[k] ?? NaN, line.points[k + 1] ?? NaN, line.points[k + 2] ?? NaN, this.point);
        const { x, y, z } = this.point;
        if (!Number.isFinite(x + y + z)) continue;
        array.set([x, y, z], filled);
        filled += 3;
      }
      attribute.needsUpdate = true;
      live.geometry.setDrawRange(0, filled / 3);
      if (line.dashed) live.strands[0]?.computeLineDistances();
    }
    for (const [id, live] of this.lines)
      if (!present.has(id)) {
        this.remove(live);
        this.lines.delete(id);
      }
  }

  private ensure(
    id: string,
    colour: string,
    dashed: boolean,
    opacity: number,
    twin: boolean,
    count: number,
  ): LiveLine {
    const look = `${colour}|${dashed}|${opacity}`;
    const known = this.lines.get(id);
    if (known && known.look === look && known.capacity >= count) return known;
    if (known) this.remove(known);
    const capacity = Math.ceil(Math.max(1, count) / CAPACITY_STEP) * CAPACITY_STEP;
    const geometry = new BufferGeometry();
    const attribute = new BufferAttribute(new Float32Array(capacity * 3), 3);
    attribute.setUsage(DynamicDrawUsage);
    geometry.setAttribute('position', attribute);
    const strands = ASIDE.slice(0, Math.min(this.strands, twin ? 2 : ASIDE.length)).map((aside) => {
      const strand = new Line(geometry, asideMaterial(colour, dashed, opacity, aside, this.size));
      strand.frustumCulled = false;
      this.group.add(strand);
      return strand;
    });
    const live = { geometry, strands, look, capacity };
    this.lines.set(id, live);
    return live;
  }

  private remove(live: LiveLine): void {
    for (const strand of live.strands) {
      this.group.remove(strand);
      for (const material of [strand.material].flat()) material.dispose();
    }
    live.geometry.dispose();
  }

  dispose(): void {
    for (const live of this.lines.values()) this.remove(live);
    this.lines.clear();
    this.grid.geometry.dispose();
    this.edges.geometry.dispose();
  }
}

function setSegments(target: LineSegments, points: readonly number[], colour: string): void {
  const current = target.geometry.getAttribute('position') as BufferAttribute | undefined;
  if (current?.array.length === points.length) {
    (current.array as Float32Array).set(points);
    current.needsUpdate = true;
  } else target.geometry.setAttribute('position', new BufferAttribute(Float32Array.from(points), 3));
  if (target.material instanceof LineBasicMaterial) target.material.color.set(colour);
}
