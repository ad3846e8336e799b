import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';

import { FieldMessage } from '@/components/fields/field-message';

import { listLinks } from './api/list-links';
import { revokeLink } from './api/revoke-link';
import { errorWords } from './error-words';
import { LinkRow } from './link-row';
import { NewLinkForm } from './new-link-form';

/** Links that open a preset without an account: making one, and those that there are. */
export function ShareLinks({ id, may }: { readonly id: string; readonly may: boolean }) {
  const queries = useQueryClient();
  const key = ['links', id];
  const links = useQuery({ queryKey: key, queryFn: () => listLinks(id), enabled: may });
  const refresh = () => queries.invalidateQueries({ queryKey: key });
  const revoke = useMutation({ mutationFn: (linkId: string) => revokeLink(id, linkId), onSuccess: refresh });
  if (!may)
    return <p className="text-sm text-muted">You may not make links to this preset; ask its owner.</p>;
  const list = links.data?.links ?? [];
  const failed = revoke.error ?? links.error;
  return (
    <section aria-labelledby="links" className="grid gap-2">
      <h3 id="links" className="text-lg">
        By link, without an account
      </h3>
      <p className="text-sm text-muted">
        A link opens the latest version, explores it fully and saves nothing.
      </p>
      <NewLinkForm id={id} onMade={() => void refresh()} />
      {failed ? <FieldMessage>{errorWords(failed)}</FieldMessage> : null}
      {list.length > 0 ? (
        <ul aria-label="Links" className="divide-y rounded-md border">
          {list.map((link) => (
            <LinkRow
              key={link.id}
              link={link}
              busy={revoke.isPending}
              onRevoke={() => revoke.mutate(link.id)}
            />
          ))}
        </ul>
      ) : links.isSuccess ? (
        <p className="text-sm text-muted">No links yet.</p>
      ) : null}
    </section>
  );
}
