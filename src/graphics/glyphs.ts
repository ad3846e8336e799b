/** Small signs drawn in a box from −1 to 1: special points, equilibria and the markers of classes. */
import type { SpecialPointKind } from '@/engine/continuation/contract';
import type { CycleSpecialKind } from '@/engine/cycles/contract';

/** `ground` is filled with the ground's colour before the stroke, `ink` with the sign's own. */
export interface GlyphPart {
  readonly d: string;
  readonly fill: 'none' | 'ground' | 'ink';
  readonly stroke: boolean;
}

const circle = (r: number, x = 0, y = 0) =>
  `M${x + r},${y}A${r},${r},0,1,1,${x - r},${y}A${r},${r},0,1,1,${x + r},${y}Z`;
const part = (d: string, fill: GlyphPart['fill'] = 'none', stroke = true): GlyphPart => ({ d, fill, stroke });

export const GLYPHS = {
  attracting: [part(circle(0.8), 'ink')],
  repelling: [part(circle(0.8), 'ground')],
  neutral: [part(circle(0.8), 'ground'), part('M0.8,0A0.8,0.8,0,1,1,-0.8,0Z', 'ink', false)],
  undecided: [part(circle(0.8), 'ground'), part('M-0.35,0H0.35')],
  start: [part(circle(0.9), 'ground')],
  fold: [part('M-0.45,-0.9L0.65,0L-0.45,0.9')],
  Hopf: [part(circle(0.85), 'ground'), part(circle(0.28), 'ink', false)],
  transcritical: [part('M-0.75,-0.75L0.75,0.75M-0.75,0.75L0.75,-0.75')],
  pitchfork: [part('M-0.95,0H0.9M-0.15,0C0.1,-0.75,0.4,-0.8,0.9,-0.8M-0.15,0C0.1,0.75,0.4,0.8,0.9,0.8')],
  'branch point': [part('M0,0V-0.9M0,0L-0.8,0.5M0,0L0.8,0.5')],
  'fold of cycles': [part('M-0.45,-0.9L0.65,0L-0.45,0.9')],
  'period doubling': [part(circle(0.4, 0, -0.52), 'ink', false), part(circle(0.4, 0, 0.52), 'ink', false)],
  torus: [part(circle(0.62, -0.32)), part(circle(0.62, 0.32))],
  'branch point of cycles': [part('M0,0V-0.9M0,0L-0.8,0.5M0,0L0.8,0.5'), part(circle(0.3), 'ground')],
  cusp: [part('M-0.85,-0.6L0.85,0L-0.85,0.6', 'ground')],
  'Bogdanov-Takens': [part('M-0.8,-0.8H0.8V0.8H-0.8Z', 'ground'), part(circle(0.3), 'ink', false)],
  'generalised Hopf': [part(circle(0.85), 'ground'), part('M0,-0.85V0.85')],
  'fold-Hopf': [part(circle(0.85), 'ground'), part('M-0.3,-0.5L0.4,0L-0.3,0.5')],
  'double Hopf': [part(circle(0.85), 'ground'), part(circle(0.45), 'none')],
  'neutral saddle': [part('M0,-0.85L0.85,0L0,0.85L-0.85,0Z', 'ground'), part('M-0.3,0H0.3')],
  circle: [part(circle(0.7), 'ink')],
  square: [part('M-0.65,-0.65H0.65V0.65H-0.65Z', 'ink')],
  triangle: [part('M0,-0.85L0.8,0.6H-0.8Z', 'ink')],
  diamond: [part('M0,-0.95L0.8,0L0,0.95L-0.8,0Z', 'ink')],
  cross: [part('M-0.7,0H0.7M0,-0.7V0.7')],
  bar: [part('M0,-0.85V0.85')],
  'hollow circle': [part(circle(0.7), 'ground')],
  'hollow square': [part('M-0.65,-0.65H0.65V0.65H-0.65Z', 'ground')],
  'hollow triangle': [part('M0,-0.85L0.8,0.6H-0.8Z', 'ground')],
  'hollow diamond': [part('M0,-0.95L0.8,0L0,0.95L-0.8,0Z', 'ground')],
} as const satisfies Record<string, readonly GlyphPart[]>;

export type GlyphName = keyof typeof GLYPHS;

const CLASS_MARKERS: readonly GlyphName[] = ['circle', 'square', 'triangle', 'diamond', 'cross', 'bar'];
const TWIN_MARKERS: readonly GlyphName[] = [
  'hollow circle',
  'hollow square',
  'hollow triangle',
  'hollow diamond',
];

/** Marker of the k-th class of the whole community. */
export function classMarker(index: number): GlyphName {
  return CLASS_MARKERS[index % CLASS_MARKERS.length] ?? 'circle';
}

export function twinMarker(index: number): GlyphName {
  return TWIN_MARKERS[index % TWIN_MARKERS.length] ?? 'hollow circle';
}

export function specialPointGlyph(kind: SpecialPointKind | CycleSpecialKind): GlyphName {
  return kind;
}

export function equilibriumGlyph(attracts: 'yes' | 'no' | 'neutral' | 'unknown'): GlyphName {
  if (attracts === 'yes') return 'attracting';
  if (attracts === 'no') return 'repelling';
  return attracts === 'neutral' ? 'neutral' : 'undecided';
}
