/** The door of the engine: what it exports is supported. */
export { createEmptyPreset, createPreset } from './schema/create';
export { readPreset, type ReadProblem, type ReadResult } from './schema/migrate';
export { presetSchema, type PresetDocument } from './schema/preset';
export { addClass, addPopulation, removeClass, removePopulation } from './schema/edit';
export { renameSymbol } from './schema/rename';
export { listClasses, listSymbols, symbolTable } from './schema/document-symbols';
export { applyTemplate, isFieldShown, TEMPLATES, templateNamed } from './schema/templates/index';
export { compileModel, type CompiledModel, type CompileResult } from './system/compile-model';
export { constantsOfMotionAt, type ConstantOfMotion } from './system/constants-of-motion';
export { checkDefinition } from './system/diagnostics';
export { effectiveTraitValues } from './system/spread';
export { spreadLimits } from './system/spread-limits';
export type { PooledTwin } from './system/pooled-twin';
export type * from './system/contract';
export { CAUTION } from './system/contract';
