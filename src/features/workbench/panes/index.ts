export { Panes } from './panes';
