import { useState } from 'react';

import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { FormField } from '@/components/ui/form-field';
import { PALETTES } from '@/graphics/palette';
import { parseNumber } from '@/lib/parse-number';
import { useTheme } from '@/lib/theme';

import { exportBlob, exportFileName, type ExportFormat, type ExportSource } from './export-source';

const FORMATS: readonly { readonly value: ExportFormat; readonly label: string; readonly help: string }[] = [
  { value: 'svg', label: 'SVG', help: 'lines that stay sharp at any size' },
  { value: 'png', label: 'PNG', help: 'pixels, twice the size below' },
  { value: 'csv', label: 'CSV', help: 'the numbers' },
];
const SMALLEST = 200;
const LARGEST = 4000;

function readSize(text: string): { readonly value: number; readonly error?: string } {
  const parsed = parseNumber(text);
  if ('problem' in parsed) return { value: NaN, error: parsed.problem };
  if (parsed.value < SMALLEST || parsed.value > LARGEST)
    return { value: NaN, error: `Between ${SMALLEST} and ${LARGEST} pixels.` };
  return { value: Math.round(parsed.value) };
}

function save(blob: Blob, name: string): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(blob);
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
}

function FormatChoice({
  value,
  onChange,
}: {
  readonly value: ExportFormat;
  readonly onChange: (next: ExportFormat) => void;
}) {
  return (
    <fieldset className="grid gap-1">
      <legend className="mb-1 font-medium">Format</legend>
      {FORMATS.map((one) => (
        <label key={one.value} className="flex items-baseline gap-2">
          <input
            type="radio"
            name="format"
            className="accent-(--accent)"
            checked={value === one.value}
            onChange={() => onChange(one.value)}
          />
          <span>
            {one.label}, <span className="text-muted">{one.help}</span>
          </span>
        </label>
      ))}
    </fieldset>
  );
}

interface ExportDialogProps {
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
  readonly getSource: () => ExportSource | null;
}

export function ExportDialog({ open, onOpenChange, getSource }: ExportDialogProps) {
  const theme = useTheme((state) => state.theme);
  const [format, setFormat] = useState<ExportFormat>('svg');
  const [width, setWidth] = useState('900');
  const [height, setHeight] = useState('600');
  const [problem, setProblem] = useState<string | null>(null);
  const sizes = [readSize(width), readSize(height)] as const;
  const wrong = format !== 'csv' && sizes.some((one) => one.error !== undefined);

  async function perform() {
    const source = getSource();
    if (!source || wrong) return;
    try {
      const blob = await exportBlob(
        source,
        format,
        PALETTES[theme],
        sizes[0].value || 900,
        sizes[1].value || 600,
      );
      save(blob, exportFileName(source.title, format));
      setProblem(null);
      onOpenChange(false);
    } catch (error) {
      setProblem(
        error instanceof Error ? error.message : 'The picture could not be written. Try another format.',
      );
    }
  }

  return (
    <Dialog open={open} onOpenChange={onOpenChange} title="Export this plot" width="narrow">
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault();
          event.stopPropagation();
          void perform();
        }}
      >
        <FormatChoice value={format} onChange={setFormat} />
        {format === 'csv' ? null : (
          <div className="grid grid-cols-2 gap-3">
            <FormField
              label="Width, pixels"
              inputMode="numeric"
              value={width}
              error={sizes[0].error}
              onChange={(event) => setWidth(event.target.value)}
            />
            <FormField
              label="Height, pixels"
              inputMode="numeric"
              value={height}
              error={sizes[1].error}
              onChange={(event) => setHeight(event.target.value)}
            />
          </div>
        )}
        {problem ? (
          <p role="alert" className="text-caution">
            {problem}
          </p>
        ) : null}
        <Button type="submit" look="primary" disabled={wrong}>
          Save the file
        </Button>
      </form>
    </Dialog>
  );
}
