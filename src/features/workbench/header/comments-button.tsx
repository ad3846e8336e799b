import { MessageSquare } from 'lucide-react';

import { plural } from '@/lib/format';

import type { CommandContext } from '../commands/command';
import { comments } from '../commands/comments';
import { useOpenCount } from '../comments/use-open-count';
import { CommandButton } from './command-button';

/** Opens the comments, with the number of open threads; there only where something is said. */
export function CommentsButton({ context }: { readonly context: () => CommandContext }) {
  const count = useOpenCount();
  if (count === 0) return null;
  return (
    <CommandButton named command={comments} context={context} look="quiet" className="px-2 max-sm:hidden">
      <MessageSquare size={16} aria-hidden />
      <span aria-hidden className="figures text-sm">
        {count}
      </span>
      <span className="sr-only">Comments, {plural(count, 'open thread')}</span>
    </CommandButton>
  );
}
