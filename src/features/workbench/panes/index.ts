export { beginPanes } from './pane';
export { defaultPanes } from './pane-settings';
export { Panes } from './panes';
