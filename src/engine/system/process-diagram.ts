import { reachable } from '../expression/index';
import { listClasses, upperFirst, describeClass } from '../schema/document-symbols';
import type { ProcessDiagram } from './contract';
import { evaluateNodes } from './evaluate-graph';
import type { ModelGraph } from './model-graph';

type Arrow = ProcessDiagram['arrows'][number];

/**
 * Nodes and arrows of the process diagram. A process draws an arrow from each class that it takes from
 * to each class that it adds to; one that only takes points out of the community, one that only adds
 * points in. Signs of effects are those at the start values.
 */
export function drawProcesses(model: ModelGraph): ProcessDiagram {
  const { document, graph, processes, stateSymbols } = model;
  const nodes = listClasses(document).map((entry) => ({
    id: entry.class.symbol,
    label: upperFirst(describeClass(entry.population, entry.class)),
    population: entry.population.symbol,
  }));
  const starts = Float64Array.from(listClasses(document), (entry) => entry.class.start || 1);
  const arrows = processes.flatMap((process): Arrow[] => {
    const definition = document.processes[process.index];
    if (definition === undefined) return [];
    const amounts = new Float64Array(process.effects.length);
    evaluateNodes(
      graph,
      process.effects.map((effect) => effect.amount),
    )(0, starts, model.defaults, amounts);
    const ends = (sign: number): readonly (string | null)[] => {
      const found = process.effects.flatMap((effect, k) =>
        Math.sign(amounts[k] ?? 0) === sign ? [stateSymbols[effect.state] ?? null] : [],
      );
      return found.length === 0 ? [null] : found;
    };
    const needed = new Set(reachable(graph, [process.rate]));
    const influences = stateSymbols.filter((_, i) => needed.has(graph.state(i)));
    return ends(-1).flatMap((from) =>
      ends(1).flatMap((to) =>
        from === null && to === null
          ? []
          : [
              {
                process: definition.id,
                name: definition.name || definition.id,
                kind: definition.kind,
                from,
                to,
                influences,
              },
            ],
      ),
    );
  });
  return { nodes, arrows };
}
