/** Bounds on a preset document. Formulas come from other people, so every size is capped. */
export const LIMITS = {
  populations: 12,
  classesPerPopulation: 12,
  classes: 30,
  traits: 40,
  entriesPerTrait: 200,
  parameters: 100,
  intermediates: 60,
  processes: 120,
  effectsPerProcess: 30,
  sweeps: 20,
  knownFacts: 60,
  tags: 12,
  symbolLength: 32,
  nameLength: 120,
  titleLength: 160,
  unitLength: 60,
  tagLength: 40,
  noteLength: 500,
  proseLength: 20_000,
  formulaLength: 2_000,
  /** Nesting of one formula; keeps recursion over the tree far from the stack's end. */
  formulaDepth: 64,
  formulaNodes: 1_200,
  /** Nodes of the whole shared graph after derivatives. */
  graphNodes: 60_000,
  documentBytes: 512 * 1024,
} as const;
