import type { DialogName } from '../layout/bench-ui';
import type { WorkbenchState } from '../state/store';

/** What a command can see and do. */
export interface CommandContext {
  readonly state: WorkbenchState;
  readonly signedIn: boolean;
  /** True where the width of the page does not allow editing. */
  readonly readOnly: boolean;
  openDialog(name: DialogName): void;
  navigate(path: string): void;
  toggleRail(): void;
  toggleFindings(): void;
}

export const COMMAND_GROUPS = ['Edit', 'Model', 'Keep and share', 'Explore', 'View'] as const;
export type CommandGroup = (typeof COMMAND_GROUPS)[number];

/** One thing that can be done on the bench, from the palette, by shortcut or by a button. */
export interface Command {
  readonly id: string;
  readonly label: string | ((context: CommandContext) => string);
  readonly group: CommandGroup;
  /** `Mod` is Ctrl, or Cmd on a Mac: `Mod+Shift+Z`. */
  readonly shortcut: string | null;
  /** True, or the reason why it cannot be done now. */
  isEnabled(context: CommandContext): true | string;
  perform(context: CommandContext): void;
}

export function labelOf(command: Command, context: CommandContext): string {
  return typeof command.label === 'string' ? command.label : command.label(context);
}

/** Runs a command if it can be; returns the reason where it cannot. */
export function run(command: Command, context: CommandContext): string | null {
  const enabled = command.isEnabled(context);
  if (enabled !== true) return enabled;
  command.perform(context);
  return null;
}
