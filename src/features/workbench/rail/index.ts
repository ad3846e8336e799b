export { ModelRail } from './model-rail';
