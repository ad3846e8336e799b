import type { ButtonHTMLAttributes } from 'react';

import { joinClasses } from '@/lib/join-classes';

type Look = 'primary' | 'plain' | 'quiet' | 'caution';

interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  readonly look?: Look;
  readonly size?: 'small' | 'normal';
}

const LOOKS: Readonly<Record<Look, string>> = {
  primary: 'border border-accent bg-accent text-accent-ink hover:opacity-90',
  plain: 'border border-hairline bg-raised text-ink hover:border-muted',
  quiet: 'border border-transparent text-ink hover:bg-panel',
  caution: 'border border-caution bg-raised text-caution hover:bg-panel',
};

export function buttonClasses(
  look: Look = 'plain',
  size: 'small' | 'normal' = 'normal',
  more?: string,
): string {
  return joinClasses(
    'inline-flex items-center justify-center gap-1.5 rounded-md font-medium whitespace-nowrap disabled:opacity-50 aria-disabled:opacity-50 disabled:cursor-not-allowed',
    size === 'small' ? 'min-h-7 px-2 text-sm' : 'min-h-9 px-3',
    LOOKS[look],
    more,
  );
}

export function Button({
  look = 'plain',
  size = 'normal',
  className,
  type = 'button',
  ...rest
}: ButtonProps) {
  return <button type={type} className={buttonClasses(look, size, className)} {...rest} />;
}
