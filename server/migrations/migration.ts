/** One step of the schema: statements that make it, and those that take it back. */
export interface Migration {
  /** Sorts after its predecessors and never changes once shipped. */
  name: string;
  up: readonly string[];
  down: readonly string[];
}
