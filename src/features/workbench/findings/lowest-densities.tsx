import { formatNumber } from '@/graphics/numbers';

import { quantityName } from '../cycles/cycle-words';
import { useShownModel } from '../panes/use-shown-model';

interface LowestDensitiesProps {
  readonly quantities: readonly string[];
  readonly lowest: Float64Array;
}

/** Lowest value of each class, and of each population of several, over a cycle. */
export function LowestDensities({ quantities, lowest }: LowestDensitiesProps) {
  const model = useShownModel();
  return (
    <p>
      Lowest:{' '}
      {quantities.map((symbol, k) => (
        <span key={`${symbol}${k}`}>
          {k > 0 ? ', ' : ''}
          {quantityName(model, symbol)}{' '}
          <span className="figures whitespace-nowrap">{formatNumber(lowest[k] ?? NaN, 3)}</span>
        </span>
      ))}{' '}
      {model.densityUnit}
    </p>
  );
}
