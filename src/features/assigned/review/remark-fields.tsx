import { Trash2 } from 'lucide-react';
import { useState } from 'react';

import { TextAreaField } from '@/components/fields/text-area-field';
import { Button } from '@/components/ui/button';
import { ASSIGNED_LIMITS, type Remark } from '@/contract/assigned-sweeps';

/** A remark that was made, to be reworded or taken back. */
export function RemarkField({
  label,
  remark,
  onChange,
  onRemove,
}: {
  readonly label: string;
  readonly remark: Remark;
  readonly onChange: (remark: Remark) => void;
  readonly onRemove: () => void;
}) {
  return (
    <div className="flex items-start gap-1">
      <TextAreaField
        label={label}
        visibleLabel={false}
        rows={2}
        className="min-w-0 flex-1"
        maxLength={ASSIGNED_LIMITS.textLength}
        value={remark.text}
        onChange={(text) => onChange({ ...remark, text })}
      />
      <Button size="small" look="quiet" aria-label={`Remove: ${label}`} onClick={onRemove}>
        <Trash2 size={16} aria-hidden />
      </Button>
    </div>
  );
}

/** A remark that is being written. */
export function NewRemark({
  label,
  onAdd,
  onCancel,
}: {
  readonly label: string;
  readonly onAdd: (text: string) => void;
  readonly onCancel: () => void;
}) {
  const [text, setText] = useState('');
  return (
    <div className="grid gap-1.5">
      <TextAreaField
        label={label}
        rows={2}
        maxLength={ASSIGNED_LIMITS.textLength}
        value={text}
        onChange={setText}
      />
      <div className="flex gap-2">
        <Button size="small" disabled={!text.trim()} onClick={() => onAdd(text)}>
          Add the remark
        </Button>
        <Button size="small" look="quiet" onClick={onCancel}>
          Cancel
        </Button>
      </div>
    </div>
  );
}
