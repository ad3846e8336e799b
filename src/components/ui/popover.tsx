import { Popover as Primitive } from 'radix-ui';
import type { ReactNode } from 'react';

import { joinClasses } from '@/lib/join-classes';

interface PopoverProps {
  readonly open?: boolean;
  readonly onOpenChange?: (open: boolean) => void;
  readonly trigger?: ReactNode;
  /** Where it stands when it is not the trigger that it belongs to. */
  readonly anchor?: ReactNode;
  readonly label: string;
  readonly children: ReactNode;
  readonly width?: 'narrow' | 'normal' | 'wide';
  readonly align?: 'start' | 'center' | 'end';
  readonly side?: 'top' | 'right' | 'bottom' | 'left';
}

const WIDTHS = { narrow: 'w-56', normal: 'w-80', wide: 'w-[26rem]' } as const;

/** A small panel beside what it is about; Escape closes it and gives the focus back. */
export function Popover(props: PopoverProps) {
  const { open, onOpenChange, trigger, anchor, label, children, width = 'normal' } = props;
  return (
    <Primitive.Root
      {...(open === undefined ? {} : { open })}
      {...(onOpenChange === undefined ? {} : { onOpenChange })}
    >
      {anchor ? <Primitive.Anchor asChild>{anchor}</Primitive.Anchor> : null}
      {trigger ? <Primitive.Trigger asChild>{trigger}</Primitive.Trigger> : null}
      <Primitive.Portal>
        <Primitive.Content
          aria-label={label}
          align={props.align ?? 'start'}
          side={props.side ?? 'bottom'}
          sideOffset={6}
          collisionPadding={8}
          className={joinClasses(
            'z-50 max-h-[min(80dvh,var(--radix-popover-content-available-height))] max-w-[calc(100vw-1rem)] overflow-y-auto rounded-lg border bg-raised p-4 text-ink shadow-lg',
            WIDTHS[width],
          )}
        >
          {children}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}
