import { DropdownMenu } from 'radix-ui';
import type { ReactNode } from 'react';

const ITEM =
  'flex cursor-pointer items-center gap-2 rounded px-2.5 py-1.5 outline-none data-[highlighted]:bg-panel data-[disabled]:cursor-not-allowed data-[disabled]:text-muted';

export function Menu({
  trigger,
  children,
  align = 'end',
}: {
  readonly trigger: ReactNode;
  readonly children: ReactNode;
  readonly align?: 'start' | 'end';
}) {
  return (
    <DropdownMenu.Root>
      <DropdownMenu.Trigger asChild>{trigger}</DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content
          align={align}
          sideOffset={6}
          className="z-50 min-w-52 rounded-lg border bg-raised p-1 text-ink shadow-lg"
        >
          {children}
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  );
}

export function MenuItem({
  onSelect,
  disabled,
  children,
}: {
  readonly onSelect: () => void;
  readonly disabled?: boolean;
  readonly children: ReactNode;
}) {
  return (
    <DropdownMenu.Item className={ITEM} onSelect={onSelect} {...(disabled ? { disabled } : {})}>
      {children}
    </DropdownMenu.Item>
  );
}

export function MenuLabel({ children }: { readonly children: ReactNode }) {
  return (
    <DropdownMenu.Label className="px-2.5 pt-1.5 pb-1 text-sm text-muted">{children}</DropdownMenu.Label>
  );
}

export function MenuSeparator() {
  return <DropdownMenu.Separator className="my-1 h-px bg-hairline" />;
}

export function MenuChoice<T extends string>({
  value,
  choices,
  onChoose,
}: {
  readonly value: T;
  readonly choices: readonly { readonly value: T; readonly label: string }[];
  readonly onChoose: (value: T) => void;
}) {
  return (
    <DropdownMenu.RadioGroup value={value} onValueChange={(next) => onChoose(next as T)}>
      {choices.map((choice) => (
        <DropdownMenu.RadioItem key={choice.value} value={choice.value} className={ITEM}>
          <span className="inline-block w-3 text-accent" aria-hidden>
            <DropdownMenu.ItemIndicator>•</DropdownMenu.ItemIndicator>
          </span>
          {choice.label}
        </DropdownMenu.RadioItem>
      ))}
    </DropdownMenu.RadioGroup>
  );
}
