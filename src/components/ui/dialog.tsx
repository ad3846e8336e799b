import { X } from 'lucide-react';
import { Dialog as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';

import { joinClasses } from '@/lib/join-classes';

interface DialogProps {
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
  readonly title: string;
  readonly description?: ReactNode;
  readonly children: ReactNode;
  readonly width?: 'narrow' | 'normal' | 'wide';
}

const WIDTHS = { narrow: 'max-w-md', normal: 'max-w-xl', wide: 'max-w-5xl' } as const;

export function Dialog({ open, onOpenChange, title, description, children, width = 'normal' }: DialogProps) {
  return (
    <Primitive.Root open={open} onOpenChange={onOpenChange}>
      <Primitive.Portal>
        <Primitive.Overlay className="fixed inset-0 z-40 bg-black/35" />
        <Primitive.Content
          {...(description ? {} : { 'aria-describedby': undefined })}
          className={joinClasses(
            'fixed top-1/2 left-1/2 z-50 max-h-[90dvh] w-[calc(100vw-1.5rem)] -translate-x-1/2 -translate-y-1/2 overflow-y-auto rounded-lg border bg-raised p-5 shadow-xl',
            WIDTHS[width],
          )}
        >
          <div className="mb-3 flex items-start justify-between gap-4">
            <Primitive.Title className="text-xl">{title}</Primitive.Title>
            <Primitive.Close
              aria-label="Close"
              className="rounded p-1 text-muted hover:bg-panel hover:text-ink"
            >
              <X size={18} aria-hidden />
            </Primitive.Close>
          </div>
          {description ? (
            <Primitive.Description className="mb-4 text-muted">{description}</Primitive.Description>
          ) : null}
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
