import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { Copy } from 'lucide-react';
import { useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import { formatDay, plural } from '@/lib/format';

import { createLink } from './api/create-link';
import { listLinks } from './api/list-links';
import { revokeLink } from './api/revoke-link';
import { errorWords } from './error-words';

/** The address that opens a shared preset as its sender sees it now. */
function addressOf(token: string): string {
  return `${window.location.origin}/s/${token}${window.location.search}`;
}

function NewLink({ address }: { readonly address: string }) {
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

export function ShareLinks({ id, may }: { readonly id: string; readonly may: boolean }) {
  const queries = useQueryClient();
  const key = ['links', id];
  const links = useQuery({ queryKey: key, queryFn: () => listLinks(id), enabled: may });
  const [label, setLabel] = useState('');
  const refresh = () => queries.invalidateQueries({ queryKey: key });
  const create = useMutation({
    mutationFn: () => createLink(id, label),
    onSuccess: () => (setLabel(''), refresh()),
  });
  const revoke = useMutation({ mutationFn: (linkId: string) => revokeLink(id, linkId), onSuccess: refresh });
  if (!may)
    return <p className="text-sm text-muted">You may not make links to this preset; ask its owner.</p>;
  const list = links.data?.links ?? [];
  const failed = create.error ?? revoke.error ?? links.error;
  return (
    <section aria-labelledby="links" className="grid gap-2">
      <h3 id="links" className="text-lg">
        By link, without an account
      </h3>
      <p className="text-sm text-muted">
        A link opens the latest version, explores it fully and saves nothing.
      </p>
      <form
        className="flex items-end gap-2"
        onSubmit={(event) => {
          event.preventDefault();
          create.mutate();
        }}
      >
        <TextField
          visibleLabel
          live
          className="flex-1"
          label="Who is it for?"
          placeholder="Reviewers of the spring paper"
          value={label}
          maxLength={120}
          onCommit={setLabel}
        />
        <Button type="submit" disabled={create.isPending}>
          Create link
        </Button>
      </form>
      {create.data ? <NewLink key={create.data.link.id} address={addressOf(create.data.token)} /> : null}
      {failed ? <FieldMessage>{errorWords(failed)}</FieldMessage> : null}
      {list.length > 0 ? (
        <ul aria-label="Links" className="divide-y rounded-md border">
          {list.map((link) => (
            <li key={link.id} className="flex items-center justify-between gap-3 px-3 py-2">
              <span className="min-w-0">
                <span className="block truncate">{link.label || 'Without a label'}</span>
                <span className="text-sm text-muted">
                  made {formatDay(link.createdAt)}, opened {plural(link.opened, 'time')}
                  {link.revokedAt ? `, revoked ${formatDay(link.revokedAt)}` : ''}
                </span>
              </span>
              {link.revokedAt ? (
                <span className="text-sm text-muted">revoked</span>
              ) : (
                <Button
                  look="caution"
                  size="small"
                  disabled={revoke.isPending}
                  onClick={() => revoke.mutate(link.id)}
                  aria-label={`Revoke ${link.label || 'this link'}`}
                >
                  Revoke
                </Button>
              )}
            </li>
          ))}
        </ul>
      ) : links.isSuccess ? (
        <p className="text-sm text-muted">No links yet.</p>
      ) : null}
    </section>
  );
}
