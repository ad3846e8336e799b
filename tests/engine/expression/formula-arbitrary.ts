import fc from 'fast-check';

/** Random formulas over states x, y, parameters a, b and the time; smooth ones have no kinks. */
export function formulas(options: {
  readonly smooth: boolean;
  readonly depth?: number;
}): fc.Arbitrary<string> {
  const depthSize = { maxDepth: options.depth ?? 5 };
  const number = fc
    .oneof(fc.integer({ min: 0, max: 4 }).map(Number), fc.double({ min: 0.05, max: 3, noNaN: true }))
    .map(String);
  const leaf = fc.oneof(fc.constantFrom('x', 'y', 'a', 'b', 't'), number);
  const { tree } = fc.letrec<{ tree: string }>((tie) => {
    const part = tie('tree');
    const binary = fc
      .tuple(part, fc.constantFrom('+', '-', '*', '/'), part)
      .map(([l, o, r]) => `(${l} ${o} ${r})`);
    const power = fc
      .tuple(
        part,
        fc.oneof(fc.integer({ min: -3, max: 5 }).map(String), fc.constantFrom('0.5', '2.5', 'a', 'b', 'x')),
      )
      .map(([base, exponent]) => `(${base})^(${exponent})`);
    const call = fc
      .tuple(fc.constantFrom('exp', 'log', 'sqrt', 'sin', 'cos', 'tanh'), part)
      .map(([name, inner]) => `${name}(${inner})`);
    const negation = part.map((inner) => `-(${inner})`);
    const kinked = fc.oneof(
      fc.tuple(fc.constantFrom('min', 'max'), part, part).map(([name, l, r]) => `${name}(${l}, ${r})`),
      part.map((inner) => `abs(${inner})`),
      fc
        .tuple(part, fc.constantFrom('<', '<=', '>', '>=', '==', '!='), part, part, part)
        .map(([l, relation, r, yes, no]) => `(${l} ${relation} ${r} ? ${yes} : ${no})`),
    );
    const branches = options.smooth
      ? [binary, power, call, negation]
      : [binary, power, call, negation, kinked];
    return { tree: fc.oneof(depthSize, leaf, ...branches) };
  });
  return tree.filter((text) => text.length < 1500);
}

export const points = fc.record({
  t: fc.double({ min: 0, max: 5, noNaN: true }),
  u: fc.tuple(fc.double({ min: -2, max: 3, noNaN: true }), fc.double({ min: 0, max: 3, noNaN: true })),
  p: fc.tuple(fc.double({ min: 0.1, max: 2, noNaN: true }), fc.double({ min: -1, max: 2, noNaN: true })),
});
