import type { BoundaryKind, BoundaryPointKind } from './contract';

/** What a point of two parameters means, in a sentence. */
export const BOUNDARY_POINT_MEANING: Readonly<Record<BoundaryPointKind, string>> = {
  cusp: 'Two folds meet here and vanish: beyond it the equilibrium changes smoothly, without a jump.',
  'Bogdanov-Takens':
    'A fold and the onset of cycles meet here: two eigenvalues are zero, and the Hopf curve ends on the fold. Near by, cycles end at homoclinic orbits.',
  'generalised Hopf':
    'The onset of cycles turns from gradual to abrupt here: the first Lyapunov coefficient is zero, and a curve of folds of cycles begins.',
  'fold-Hopf':
    'A zero eigenvalue and an imaginary pair meet here: tori and complicated motion may begin near by.',
  'double Hopf': 'Two imaginary pairs meet here: two kinds of cycles compete, and tori may begin near by.',
};

/** What each kind of curve separates. */
export const BOUNDARY_NAMES: Readonly<Record<BoundaryKind, string>> = {
  fold: 'folds',
  Hopf: 'onset of cycles (Hopf)',
  transcritical: 'boundary crossings (transcritical)',
  pitchfork: 'pitchforks',
};
