export { Findings } from './findings';
