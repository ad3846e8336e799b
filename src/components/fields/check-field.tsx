import { useId } from 'react';

import { joinClasses } from '@/lib/join-classes';

interface CheckFieldProps {
  readonly label: string;
  readonly checked: boolean;
  readonly onChange: (checked: boolean) => void;
  readonly help?: string;
  readonly disabled?: boolean;
  readonly className?: string;
}

export function CheckField({ label, checked, onChange, help, disabled, className }: CheckFieldProps) {
  const id = useId();
  return (
    <div className={joinClasses('flex items-start gap-2', className)}>
      <input
        id={id}
        type="checkbox"
        className="mt-1 size-4 shrink-0 accent-[var(--accent)]"
        checked={checked}
        disabled={disabled}
        aria-describedby={help ? `${id}-help` : undefined}
        onChange={(event) => onChange(event.target.checked)}
      />
      <div className="min-w-0">
        <label htmlFor={id}>{label}</label>
        {help ? (
          <p id={`${id}-help`} className="text-sm text-muted">
            {help}
          </p>
        ) : null}
      </div>
    </div>
  );
}
