/** Initial value problems with known answers, each with where the answer comes from. */
import type { CompiledSystem } from '../../src/engine/system/contract';
import { systemFromEquations } from '../../src/engine/system/from-equations';

export interface InitialValueProblem {
  readonly name: string;
  readonly equations: readonly string[];
  readonly parameters: Readonly<Record<string, number>>;
  readonly start: readonly number[];
  /** Known states by time. */
  readonly states: readonly (readonly [number, readonly number[]])[];
  readonly source: string;
}

export function compileProblem(
  problem: Pick<InitialValueProblem, 'equations' | 'parameters'>,
  nonnegative = false,
): CompiledSystem {
  const made = systemFromEquations({
    equations: problem.equations,
    parameters: problem.parameters,
    nonnegative,
  });
  if (!made.ok) throw new Error(made.message);
  return made.system;
}

/** Case A1. */
export const CLASSIC_PREDATOR_PREY: InitialValueProblem = {
  name: 'predator and prey without self-regulation',
  equations: ["x' = x*(1 - y)", "y' = y*(x - 1)"],
  parameters: {},
  start: [0.5, 0.5],
  states: [
    [1, [0.8995871398673474, 0.3604298021967716]],
    [10, [1.8095759537589062, 1.7010661428328864]],
    [50, [1.9913175586286378, 1.466977416833664]],
    [100, [0.4174007266277082, 0.624697758694918]],
  ],
  source: 'Lotka (1925), Volterra (1926): first integral; states computed at high precision',
};

/** Case A4. */
export const ARENSTORF: InitialValueProblem = {
  name: 'restricted three-body problem',
  equations: [
    "x' = u",
    "y' = v",
    "u' = x + 2*v - (1-mu)*(x+mu)*((x+mu)^2+y^2)^(-3/2) - mu*(x-1+mu)*((x-1+mu)^2+y^2)^(-3/2)",
    "v' = y - 2*u - (1-mu)*y*((x+mu)^2+y^2)^(-3/2) - mu*y*((x-1+mu)^2+y^2)^(-3/2)",
  ],
  parameters: { mu: 0.012277471 },
  start: [0.994, 0, 0, -2.0015851063790824],
  states: [
    [2, [-0.5798767232363895, 0.6090783555023062, -0.4225300922738806, 0.24422199185507654]],
    [5, [0.022688783647977124, 0.8665401401712473, -0.1177364786408644, -0.42178580416287775]],
    [17.065216560157964, [0.994, 0, 0, -2.0015851063790824]],
  ],
  source: 'Hairer, Norsett & Wanner, Solving ODEs I (2nd ed. 1993), pp. 129-130: the orbit closes',
};

/** Case A5. */
export const BRUSSELATOR: InitialValueProblem = {
  name: 'Brusselator',
  equations: ["x' = A + x^2*y - (B+1)*x", "y' = B*x - x^2*y"],
  parameters: { A: 1, B: 3 },
  start: [1.5, 3],
  states: [[20, [0.49863707126834783, 4.596780349452011]]],
  source: 'Hairer, Norsett & Wanner, Solving ODEs I, sect. II.4; reference digits from stored test sets',
};

/** Case A6. */
export const ROBERTSON: InitialValueProblem = {
  name: 'Robertson kinetics',
  equations: ["a' = -0.04*a + k*b*c", "b' = 0.04*a - k*b*c - m*b^2", "c' = m*b^2"],
  parameters: { k: 1e4, m: 3e7 },
  start: [1, 0, 0],
  states: [
    [0.4, [0.9851721138609931, 3.386395378974941e-5, 0.01479402218521893]],
    [40, [0.715827068719405, 9.185534764557764e-6, 0.28416374574583037]],
    [4000, [0.18320225777671004, 8.942371252776118e-7, 0.8167968479861691]],
    [4e5, [0.004938274520979821, 1.984994087954366e-8, 0.995061705629085]],
    [1e11, [2.083340149701255e-8, 8.333360770334713e-14, 0.999999979166505]],
  ],
  source: 'Robertson (1966); t = 1e11: Test Set for IVP Solvers, problem ROBER; others computed',
};

const GROWTH = { r: 0.7, K: 10, theta: 2.5 };

/** Case A9: closed forms of single-species growth. */
export const GROWTH_LAWS: readonly (InitialValueProblem & { readonly exact: (t: number) => number })[] = [
  {
    name: 'logistic growth',
    equations: ["n' = r*n*(1-n/K)"],
    parameters: GROWTH,
    start: [0.4],
    states: [
      [5, [5.7979847524698656]],
      [12, [9.946321534984136]],
    ],
    source: 'Verhulst (1838), closed form',
    exact: (t) => 10 / (1 + (10 / 0.4 - 1) * Math.exp(-0.7 * t)),
  },
  {
    name: 'theta-logistic growth',
    equations: ["n' = r*n*(1-(n/K)^theta)"],
    parameters: GROWTH,
    start: [0.4],
    states: [
      [5, [8.514118051243564]],
      [12, [9.9999905248482]],
    ],
    source: 'closed form in (n/K)^-theta',
    exact: (t) => 10 * (1 + ((0.4 / 10) ** -2.5 - 1) * Math.exp(-0.7 * 2.5 * t)) ** (-1 / 2.5),
  },
  {
    name: 'Gompertz growth',
    equations: ["n' = r*n*log(K/n)"],
    parameters: GROWTH,
    start: [0.4],
    states: [
      [5, [9.073730363562023]],
      [12, [9.992764419008974]],
    ],
    source: 'Gompertz, closed form in log(n/K)',
    exact: (t) => 10 * Math.exp(Math.log(0.4 / 10) * Math.exp(-0.7 * t)),
  },
];

/** Case A10: predator split into two classes of unequal mortality. */
export const SPLIT_PREDATOR_EQUATIONS = [
  "x' = x - x*(y1+y2)",
  "y1' = x*(y1+y2)/2 - (1+eps)*y1",
  "y2' = x*(y1+y2)/2 - (1-eps)*y2",
] as const;

const splitPredator = (eps: number, states: InitialValueProblem['states']): InitialValueProblem => ({
  name: `predator of two classes, eps = ${eps}`,
  equations: SPLIT_PREDATOR_EQUATIONS,
  parameters: { eps },
  start: [0.5, 0.25, 0.25],
  states,
  source: 'computed at high precision; eps = 0 repeats the unsplit predator',
});

export const SPLIT_PREDATORS: readonly InitialValueProblem[] = [
  splitPredator(0, [
    [5, [0.3949733682765566, 0.6979912902766986, 0.6979912902766986]],
    [20, [0.48037780996274315, 0.26064750440931983, 0.26064750440931983]],
    [100, [0.4174007266277082, 0.312348879347459, 0.312348879347459]],
  ]),
  splitPredator(0.3, [
    [5, [0.38130418724550735, 0.4748596547029569, 0.9656359958974992]],
    [20, [0.4380333849137058, 0.29112963043250395, 0.6787158790038753]],
    [100, [0.9448829854929683, 0.40340296915343093, 0.7165190784920508]],
  ]),
  splitPredator(0.9, [
    [5, [0.13698163097987487, 0.13626495364057561, 1.81751821005639]],
    [20, [0.07494639343773903, 0.007992132590181049, 0.4883949616806345]],
    [100, [0.1852268898034075, 0.041456747725639786, 0.8536940829218159]],
  ]),
];
