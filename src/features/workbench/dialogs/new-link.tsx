import { Copy } from 'lucide-react';
import { useState } from 'react';

import { Button } from '@/components/ui/button';

/** The address of a link that was just made; it is shown this once. */
export function NewLink({ address }: { readonly address: string }) {
  const [copied, setCopied] = useState<'no' | 'yes' | 'refused'>('no');
  const handleCopy = () => {
    navigator.clipboard.writeText(address).then(
      () => setCopied('yes'),
      () => setCopied('refused'),
    );
  };
  return (
    <div className="grid gap-2 rounded-md border border-accent bg-panel p-3">
      <p className="text-sm">
        Copy this address now: it is shown once, and opens the preset without an account.
      </p>
      <div className="flex gap-2">
        <input
          readOnly
          aria-label="Address of the new link"
          value={address}
          className="figures min-w-0 flex-1 rounded-md border bg-raised px-2 text-sm"
          onFocus={(event) => event.target.select()}
        />
        <Button onClick={handleCopy}>
          <Copy size={14} aria-hidden /> Copy
        </Button>
      </div>
      <p role="status" className="text-sm text-muted">
        {copied === 'yes'
          ? 'Copied.'
          : copied === 'refused'
            ? 'The browser did not allow copying; select the address and copy it by hand.'
            : ''}
      </p>
    </div>
  );
}
