import type { Eigenvalue } from '@/engine/equilibria/contract';
import { formatNumber } from '@/graphics/numbers';

import { eigenvalueTexts } from './eigenvalue-texts';

interface MultipliersProps {
  /** The trivial one first, unless the model is forced, which has none. */
  readonly values: readonly Eigenvalue[];
  readonly forced: boolean;
}

/** Floquet multipliers; the trivial one, which must be 1, says what they are worth. */
export function Multipliers({ values, forced }: MultipliersProps) {
  const trivial = forced ? undefined : values[0];
  const others = forced ? values : values.slice(1);
  const error = trivial ? Math.hypot(trivial.re - 1, trivial.im) : 0;
  return (
    <p>
      {others.length === 1 ? 'Multiplier ' : 'Multipliers '}
      <span className="figures">{others.length > 0 ? eigenvalueTexts(others).join('; ') : 'none'}</span>
      {trivial ? (
        <>
          . The trivial one is 1 to <span className="figures">{formatNumber(error, 1)}</span>, which says how
          accurate they are.
        </>
      ) : (
        '.'
      )}
    </p>
  );
}
