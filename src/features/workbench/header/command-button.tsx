import type { ReactNode } from 'react';

import { buttonClasses } from '@/components/ui/button';
import { Tooltip } from '@/components/ui/tooltip';

import { labelOf, run, type Command, type CommandContext } from '../commands/command';
import { keysOf } from '../commands/shortcut';
import { useBenchUi } from '../layout/bench-ui';

interface CommandButtonProps {
  readonly command: Command;
  readonly context: () => CommandContext;
  readonly look?: 'primary' | 'plain' | 'quiet';
  readonly className?: string;
  /** What stands on the button; the command's label is its name. */
  readonly children: ReactNode;
  /** Where the words on the button are its name already. */
  readonly named?: boolean;
}

/** A button for a command: its tooltip names it, its keys, and why it cannot be used now. */
export function CommandButton(props: CommandButtonProps) {
  const { command, context, look = 'plain', className, children, named = false } = props;
  const now = context();
  const enabled = command.isEnabled(now);
  const label = labelOf(command, now);
  const words = enabled === true ? label : `${label}. ${enabled}`;
  const keys = command.shortcut && enabled === true ? ` (${keysOf(command.shortcut).join(' ')})` : '';
  return (
    <Tooltip text={words + keys}>
      <button
        type="button"
        aria-disabled={enabled === true ? undefined : true}
        {...(named ? {} : { 'aria-label': label })}
        className={buttonClasses(look, 'normal', className)}
        onClick={() => {
          const reason = run(command, context());
          if (reason) useBenchUi.getState().set({ notice: reason });
        }}
      >
        {children}
      </button>
    </Tooltip>
  );
}
