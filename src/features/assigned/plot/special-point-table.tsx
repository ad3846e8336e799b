import { formatNumber } from '@/graphics/numbers';

import type { KeptLayer } from './kept-sweep-spec';

/** The special points of the plot in numbers and words. */
export function SpecialPointTable({
  layers,
  parameter,
}: {
  readonly layers: readonly KeptLayer[];
  readonly parameter: string;
}) {
  const rows = layers.flatMap(({ id, name, model }) =>
    model.points.map((point, index) => ({ key: `${id}:${index}`, name, point })),
  );
  if (rows.length === 0) return null;
  return (
    <details className="rounded-lg border bg-raised">
      <summary className="cursor-pointer px-3 py-1.5">Special points as a table</summary>
      <div tabIndex={0} role="region" aria-label="Special points" className="max-h-72 overflow-auto border-t">
        <table className="w-full text-sm">
          <thead className="bg-panel text-left">
            <tr>
              <th scope="col" className="px-3 py-1 font-medium">
                kind
              </th>
              <th scope="col" className="px-3 py-1 font-medium">
                of
              </th>
              <th scope="col" className="figures px-3 py-1 text-right font-medium">
                {parameter}
              </th>
              <th scope="col" className="px-3 py-1 font-medium">
                meaning
              </th>
            </tr>
          </thead>
          <tbody className="divide-y">
            {rows.map(({ key, name, point }) => (
              <tr key={key}>
                <td className="px-3 py-1">{point.kind}</td>
                <td className="px-3 py-1">{name}</td>
                <td className="figures px-3 py-1 text-right">{formatNumber(point.parameter, 7)}</td>
                <td className="px-3 py-1 text-muted">{point.meaning}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}
