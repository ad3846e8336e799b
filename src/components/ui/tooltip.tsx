import { Tooltip as Primitive } from 'radix-ui';
import type { ReactElement } from 'react';

/** A few words beside what has the pointer or the focus. */
export function Tooltip({ text, children }: { readonly text: string; readonly children: ReactElement }) {
  return (
    <Primitive.Provider delayDuration={400}>
      <Primitive.Root>
        <Primitive.Trigger asChild>{children}</Primitive.Trigger>
        <Primitive.Portal>
          <Primitive.Content
            sideOffset={6}
            collisionPadding={8}
            className="z-50 max-w-72 rounded-md bg-ink px-2.5 py-1.5 text-sm text-paper shadow-md"
          >
            {text}
          </Primitive.Content>
        </Primitive.Portal>
      </Primitive.Root>
    </Primitive.Provider>
  );
}
