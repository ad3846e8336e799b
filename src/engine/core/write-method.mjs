import { readFileSync } from 'node:fs';

import ts from 'typescript';

/** The tableau that a file in `integrators/tableaus` exports. */
export async function readTableau(file) {
  const { outputText } = ts.transpileModule(readFileSync(file, 'utf8'), {
    compilerOptions: { module: ts.ModuleKind.ESNext, target: ts.ScriptTarget.ES2022 },
  });
  const module = await import(`data:text/javascript,${encodeURIComponent(outputText)}`);
  return Object.values(module)[0];
}

const literal = (value) => (Number.isInteger(value) ? `${value}.0` : String(value));

/** weight_0 * k_0[i] + ..., without the zeros; i in bytes. */
function combination(row) {
  const terms = row.flatMap((weight, j) =>
    weight === 0 ? [] : [`${literal(weight)} * load<f64>(k + ${j} * bytes + i)`],
  );
  return terms.length > 0 ? terms.join(' + ') : '0.0';
}

const loop = (body) => `  for (let i: usize = 0; i < bytes; i += 8) {\n${body}\n  }`;

/** AssemblyScript of one explicit pair: an attempted step with its error, and the dense output. */
export function writeMethod(tableau) {
  const { a, b, c, error, lowOrderError, denseA, denseC, dense } = tableau;
  const stages = b.length;
  const usesEnd = error.length > stages;
  const stageLines = a
    .slice(1)
    .flatMap((row, index) => [
      loop(`    store<f64>(stage + i, load<f64>(y + i) + h * (${combination(row)}));`),
      `  rhs(t + ${literal(c[index + 1])} * h, stage, k + ${index + 1} * bytes);`,
    ]);
  const estimates = [
    '    const size = Math.max(Math.abs(load<f64>(y + i)), Math.abs(load<f64>(proposal + i)));',
    '    const tolerance = absolute + relative * size;',
    `    const high = (h * (${combination(error)})) / tolerance;`,
    '    squares += high * high;',
    ...(lowOrderError
      ? [`    const low = (h * (${combination(lowOrderError)})) / tolerance;`, '    lows += low * low;']
      : []),
  ];
  const answer = lowOrderError
    ? [
        '  const corrected = squares + 0.01 * lows;',
        '  return corrected === 0 ? 0 : squares / Math.sqrt(corrected * <f64>n);',
      ]
    : ['  return Math.sqrt(squares / <f64>n);'];
  const denseStages = denseA.flatMap((row, index) => [
    loop(`    store<f64>(spare + i, load<f64>(previous + i) + h * (${combination(row)}));`),
    `  rhs(t + ${literal(denseC[index])} * h, spare, k + ${stages + 1 + index} * bytes);`,
  ]);
  const denseRows = dense.map(
    (row, m) => `    store<f64>(out + ${m + 3} * bytes + i, h * (${combination(row)}));`,
  );
  return `import { rhs } from './model';

export const STAGES = ${stages};
export const SLOPES = ${stages + 1 + denseA.length};
export const DENSE_ROWS = ${dense.length + 3};
export const USES_END = ${usesEnd};
export const EVALUATIONS_A_STEP: f64 = ${stages - 1 + (usesEnd ? 1 : 0)};
export const DENSE_EVALUATIONS: f64 = ${denseA.length};
export const ERROR_EXPONENT: f64 = ${tableau.errorExponent};
export const CONTROL_BETA: f64 = ${tableau.controlBeta};
export const SMALLEST_FACTOR: f64 = ${tableau.smallestFactor};
export const LARGEST_FACTOR: f64 = ${tableau.largestFactor};
export const STIFFNESS_LIMIT: f64 = ${tableau.stiffnessLimit};

export function attempt(
  t: f64, h: f64, n: i32, y: usize, k: usize, stage: usize, proposal: usize, relative: f64, absolute: f64,
): f64 {
  const bytes = (<usize>n) << 3;
${stageLines.join('\n')}
${loop(`    store<f64>(proposal + i, load<f64>(y + i) + h * (${combination(b)}));`)}
${usesEnd ? `  rhs(t + h, proposal, k + ${stages} * bytes);` : ''}
  let squares: f64 = 0;
${lowOrderError ? '  let lows: f64 = 0;' : ''}
${loop(estimates.join('\n'))}
${answer.join('\n')}
}

export function prepareDense(
  t: f64, h: f64, n: i32, previous: usize, y: usize, k: usize, spare: usize, out: usize,
): void {
  const bytes = (<usize>n) << 3;
${denseStages.join('\n')}
${loop(
  [
    '    const change = load<f64>(y + i) - load<f64>(previous + i);',
    '    store<f64>(out + i, change);',
    '    store<f64>(out + bytes + i, h * load<f64>(k + i) - change);',
    `    store<f64>(out + 2 * bytes + i, 2 * change - h * (load<f64>(k + i) + load<f64>(k + ${stages} * bytes + i)));`,
    ...denseRows,
  ].join('\n'),
)}
}
`;
}
