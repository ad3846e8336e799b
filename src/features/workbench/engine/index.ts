export { useEngineDriver } from './use-engine-driver';
export { readParameterValue, withParameterValue, withStart } from './parameter-values';
