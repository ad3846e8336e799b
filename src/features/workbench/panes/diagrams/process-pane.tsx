import { useId, useMemo, useState } from 'react';

import { PALETTES, populationColour } from '@/graphics/palette';
import { useTheme } from '@/lib/theme';

import { useWorkbench } from '../../state/store';
import { useShownModel } from '../use-shown-model';
import { layoutDiagram } from './diagram-layout';

const NODE_HEIGHT = 40;

/** Classes and the processes between them, layered by population. */
export function ProcessPane() {
  const report = useWorkbench((state) => state.shownReport);
  const model = useShownModel();
  const palette = PALETTES[useTheme((state) => state.theme)];
  const marker = useId();
  const [picked, setPicked] = useState<string | null>(null);
  const layout = useMemo(
    () => (report ? layoutDiagram(report.diagram, model.populations) : null),
    [report, model.populations],
  );
  if (!layout || layout.nodes.length === 0)
    return (
      <p className="grid flex-1 place-items-center p-6 text-center text-muted">
        Nothing to draw yet. Add a population and a process in the model rail.
      </p>
    );
  const influences = layout.arrows.find((one) => one.process === picked)?.influences ?? [];
  const hues = new Map(model.populations.map((one) => [one.symbol, one]));
  return (
    <div className="grid min-h-0 flex-1 place-items-center overflow-auto p-2">
      <svg
        viewBox={`0 0 ${layout.width} ${layout.height}`}
        className="mx-auto block max-h-full w-full"
        role="img"
        aria-label={`Process diagram: ${layout.nodes.map((one) => one.label).join(', ')}; ${layout.arrows.map((one) => one.name).join(', ')}`}
      >
        <defs>
          <marker
            id={marker}
            viewBox="0 0 8 8"
            refX="7"
            refY="4"
            markerWidth="7"
            markerHeight="7"
            orient="auto-start-reverse"
          >
            <path d="M0,0.8L7,4L0,7.2Z" fill={palette.muted} />
          </marker>
        </defs>
        {layout.arrows.map((arrow) => (
          <g
            key={arrow.key}
            onPointerEnter={() => setPicked(arrow.process)}
            onPointerLeave={() => setPicked(null)}
          >
            <path d={arrow.d} fill="none" stroke="transparent" strokeWidth={14} />
            <path
              d={arrow.d}
              fill="none"
              stroke={picked === arrow.process ? palette.accent : palette.muted}
              strokeWidth={picked === arrow.process ? 2.4 : 1.6}
              markerEnd={`url(#${marker})`}
            />
            <text
              x={arrow.labelX}
              y={arrow.labelY}
              textAnchor={arrow.anchor}
              fontSize={13}
              fill={palette.ink}
              stroke={palette.raised}
              strokeWidth={4}
              paintOrder="stroke"
            >
              {arrow.label.map((line, k) => (
                <tspan key={line} x={arrow.labelX} dy={k === 0 ? (arrow.label.length - 1) * -7 : 15}>
                  {line}
                </tspan>
              ))}
            </text>
          </g>
        ))}
        {layout.nodes.map((node) => {
          const population = hues.get(node.population);
          const colour = population ? populationColour(population.hue, palette, 1) : palette.ink;
          return (
            <g key={node.id}>
              <rect
                x={node.x - node.width / 2}
                y={node.y - NODE_HEIGHT / 2}
                width={node.width}
                height={NODE_HEIGHT}
                rx={10}
                fill={palette.raised}
                stroke={colour}
                strokeWidth={influences.includes(node.id) ? 4 : 2}
              />
              <text
                x={node.x}
                y={node.y + 5}
                textAnchor="middle"
                fontSize={15}
                fontWeight={600}
                fill={palette.ink}
              >
                {node.label}
              </text>
            </g>
          );
        })}
      </svg>
    </div>
  );
}
