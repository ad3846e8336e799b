import { X } from 'lucide-react';
import { Dialog } from 'radix-ui';
import type { ReactNode } from 'react';

import { joinClasses } from '@/lib/join-classes';

interface SheetProps {
  readonly side: 'left' | 'right';
  readonly title: string;
  readonly open: boolean;
  readonly onClose: () => void;
  readonly children: ReactNode;
}

/** A rail over the panes, where there is no room for it beside them. */
export function Sheet({ side, title, open, onClose, children }: SheetProps) {
  return (
    <Dialog.Root open={open} onOpenChange={(next) => (next ? undefined : onClose())}>
      <Dialog.Portal>
        <Dialog.Overlay className="fixed inset-0 z-30 bg-black/25" />
        <Dialog.Content
          aria-describedby={undefined}
          className={joinClasses(
            'fixed inset-y-0 z-30 flex w-[min(25rem,100vw)] flex-col bg-panel shadow-xl outline-none',
            side === 'left' ? 'left-0 border-r' : 'right-0 border-l',
          )}
        >
          <div className="flex min-h-12 items-center justify-between border-b border-hairline px-4">
            <Dialog.Title className="text-lg">{title}</Dialog.Title>
            <Dialog.Close
              aria-label={`Close ${title.toLowerCase()}`}
              className="rounded p-1.5 text-muted hover:text-ink"
            >
              <X size={18} aria-hidden />
            </Dialog.Close>
          </div>
          <div className="min-h-0 flex-1 overflow-y-auto">{children}</div>
        </Dialog.Content>
      </Dialog.Portal>
    </Dialog.Root>
  );
}
