/** The package odex under types of our own: the .ts that it ships beside its .js fails strict checks. */
export { Solver } from 'odex';
