import { Slider as Primitive } from 'radix-ui';

interface SliderProps {
  readonly label: string;
  readonly value: number;
  readonly min: number;
  readonly max: number;
  readonly step?: number;
  readonly valueText?: string;
  readonly disabled?: boolean;
  readonly onChange: (value: number) => void;
  /** Small marks beneath the track. */
  readonly ticks?: readonly { readonly at: number; readonly label: string }[];
}

export function Slider({
  label,
  value,
  min,
  max,
  step,
  valueText,
  disabled,
  onChange,
  ticks = [],
}: SliderProps) {
  const span = max - min;
  const shown = Math.min(max, Math.max(min, value));
  const inset = (at: number) => `calc(0.5rem + ${(at - min) / span} * (100% - 1rem))`;
  return (
    <div className={ticks.length > 0 ? 'relative pb-4' : 'relative'}>
      <Primitive.Root
        className="relative flex h-6 w-full touch-none items-center select-none"
        value={[shown]}
        min={min}
        max={max}
        step={step ?? niceStep(span)}
        disabled={disabled ?? false}
        onValueChange={([next]) => {
          if (next !== undefined) onChange(next);
        }}
      >
        <Primitive.Track className="relative h-1 flex-1 rounded-full bg-hairline">
          <Primitive.Range className="absolute h-full rounded-full bg-accent" />
        </Primitive.Track>
        <Primitive.Thumb
          aria-label={label}
          {...(valueText ? { 'aria-valuetext': valueText } : {})}
          className="block size-4 rounded-full border-2 border-raised bg-accent shadow-[0_0_0_1px_var(--accent)] data-[disabled]:bg-muted"
        />
      </Primitive.Root>
      {ticks
        .filter((tick) => tick.at >= min && tick.at <= max)
        .map((tick) => (
          <span
            key={tick.at}
            aria-hidden
            className="pointer-events-none absolute top-4 flex -translate-x-1/2 flex-col items-center text-xs leading-none text-muted"
            style={{ left: inset(tick.at) }}
          >
            <span className="mb-0.5 h-1.5 w-px bg-muted" />
            {tick.label}
          </span>
        ))}
    </div>
  );
}

/** A two-hundredth of the span, rounded to 1, 2 or 5 times a power of ten. */
export function niceStep(span: number): number {
  if (!(span > 0) || !Number.isFinite(span)) return 0.01;
  const rough = span / 200;
  const power = 10 ** Math.floor(Math.log10(rough));
  const lead = rough / power;
  return (lead < 1.5 ? 1 : lead < 3.5 ? 2 : lead < 7.5 ? 5 : 10) * power;
}
