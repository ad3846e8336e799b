import type { ProcessDiagram } from '@/engine/system/contract';
import type { PresetDocument } from '@/engine/schema/preset';

export interface PlacedNode {
  readonly id: string;
  readonly label: string;
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly population: string;
}

export interface PlacedArrow {
  readonly key: string;
  readonly process: string;
  readonly name: string;
  /** The name on up to two lines; none where another arrow of the process carries it. */
  readonly label: readonly string[];
  readonly kind: string;
  readonly d: string;
  readonly labelX: number;
  readonly labelY: number;
  readonly anchor: 'start' | 'middle' | 'end';
  readonly influences: readonly string[];
}

export interface DiagramLayout {
  readonly width: number;
  readonly height: number;
  readonly nodes: readonly PlacedNode[];
  readonly arrows: readonly PlacedArrow[];
}

const ROW = 150;
const NODE_HEIGHT = 40;
const COLUMN = 250;
/** Room for an arrow at the side, and for each letter of its name. */
const SIDE_ARROW = 46;
const LETTER = 6.9;
const LINE_LETTERS = 16;
const MARGIN_Y = 70;
/** Distance between the ends of several arrows at one side of a node. */
const FAN = 22;

/** Breaks a name in two near its middle. */
export function twoLines(name: string): readonly string[] {
  if (name.length <= LINE_LETTERS) return [name];
  const middle = name.length / 2;
  let at = -1;
  for (let k = 0; k < name.length; k++)
    if (name[k] === ' ' && (at < 0 || Math.abs(k - middle) < Math.abs(at - middle))) at = k;
  return at < 0 ? [name] : [name.slice(0, at), name.slice(at + 1)];
}

/** The arrow of each process that carries its name: towards a class that the rate depends on, else the first. */
function nameCarriers(diagram: ProcessDiagram): ReadonlySet<ProcessDiagram['arrows'][number]> {
  const carriers = new Map<string, ProcessDiagram['arrows'][number]>();
  for (const arrow of diagram.arrows) {
    const towardsDriver = arrow.from !== null && arrow.to !== null && arrow.influences.includes(arrow.to);
    const held = carriers.get(arrow.process);
    const heldDrives = held?.to !== null && held !== undefined && held.influences.includes(held.to);
    if (!held || (towardsDriver && !heldDrives)) carriers.set(arrow.process, arrow);
  }
  return new Set(carriers.values());
}

const longestLine = (name: string) => Math.max(...twoLines(name).map((line) => line.length));

/** Layers are populations, the first at the bottom as in a food chain; classes stand side by side. */
export function layoutDiagram(
  diagram: ProcessDiagram,
  populations: PresetDocument['populations'],
): DiagramLayout {
  const layers = populations
    .map((population) => diagram.nodes.filter((node) => node.population === population.symbol))
    .filter((layer) => layer.length > 0);
  const widest = Math.max(1, ...layers.map((layer) => layer.length));
  const outside = diagram.arrows.filter((arrow) => arrow.from === null || arrow.to === null);
  const margin =
    SIDE_ARROW + LETTER * outside.reduce((most, arrow) => Math.max(most, longestLine(arrow.name)), 8);
  const nodeWidth = (label: string) => Math.max(90, label.length * 8 + 26);
  const broadest = diagram.nodes.reduce((most, node) => Math.max(most, nodeWidth(node.label)), 90);
  const column = Math.max(COLUMN, broadest + margin + FAN);
  const width = 2 * margin + (widest - 1) * column + broadest;
  const height = 2 * MARGIN_Y + Math.max(1, layers.length) * ROW - (ROW - NODE_HEIGHT);
  const nodes: PlacedNode[] = layers.flatMap((layer, level) =>
    layer.map((node, k) => ({
      ...node,
      x: width / 2 + (k - (layer.length - 1) / 2) * column,
      y: height - MARGIN_Y - NODE_HEIGHT / 2 - level * ROW,
      width: nodeWidth(node.label),
    })),
  );
  const at = new Map(nodes.map((node) => [node.id, node]));
  const used = new Map<string, number>();
  const slot = (id: string, side: string) => {
    const key = `${id}:${side}`;
    const next = used.get(key) ?? 0;
    used.set(key, next + 1);
    return next;
  };
  const spread = (k: number) => (k % 2 === 0 ? k / 2 : -(k + 1) / 2) * FAN;
  const carriers = nameCarriers(diagram);
  const arrows = diagram.arrows.flatMap((arrow, order): PlacedArrow[] => {
    const from = arrow.from === null ? null : at.get(arrow.from);
    const to = arrow.to === null ? null : at.get(arrow.to);
    const label = carriers.has(arrow) ? twoLines(arrow.name) : [];
    const { process, name, kind, influences } = arrow;
    const base = { key: `${process}:${order}`, process, name, label, kind, influences };
    if (from && to && from !== to) {
      const bend = spread(slot([from.id, to.id].sort().join('-'), 'between') + 1);
      const up = to.y < from.y ? -1 : to.y > from.y ? 1 : 0;
      const side = to.x > from.x ? 1 : -1;
      const x1 = from.x + (up === 0 ? (side * from.width) / 2 : bend);
      const y1 = from.y + (up * NODE_HEIGHT) / 2 + (up === 0 ? bend / 2 : 0);
      const x2 = to.x - (up === 0 ? (side * to.width) / 2 : -bend);
      const y2 = to.y - (up * NODE_HEIGHT) / 2 + (up === 0 ? bend / 2 : 0);
      const midX = (x1 + x2) / 2 + (up === 0 ? 0 : bend);
      const midY = (y1 + y2) / 2 + (up === 0 ? -18 - Math.abs(bend) : 0);
      return [
        {
          ...base,
          d: `M${x1},${y1}Q${midX},${midY} ${x2},${y2}`,
          labelX: midX + (up === 0 ? 0 : x2 < x1 ? -10 : 10),
          labelY: up === 0 ? midY : midY + (order % 2 === 0 ? -14 : 16),
          anchor: up === 0 ? 'middle' : x2 < x1 ? 'end' : 'start',
        },
      ];
    }
    const node = from ?? to;
    if (!node) return [];
    // Losses leave on the right, gains come in on the left.
    const leaving = Boolean(from) && !to;
    const sign = leaving ? 1 : -1;
    const edge = node.x + (sign * node.width) / 2;
    const y = node.y + spread(slot(node.id, leaving ? 'out' : 'in'));
    const outer = edge + sign * 34;
    return [
      {
        ...base,
        d: leaving ? `M${edge},${y}H${outer}` : `M${outer},${y}H${edge}`,
        labelX: outer + sign * 5,
        labelY: y + 4,
        anchor: leaving ? 'start' : 'end',
      },
    ];
  });
  return { width, height, nodes, arrows };
}
