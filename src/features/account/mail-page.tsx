import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';

import { ErrorState, LoadingState, PageState } from '@/components/states/page-state';
import { Button } from '@/components/ui/button';
import { formatDayAndTime } from '@/lib/format';
import { joinClasses } from '@/lib/join-classes';

import { fetchMail, fetchMailList } from './api/account-operations';
import { LINK_CLASSES } from './components/narrow-page';

/** Plain text with the addresses of this very server made into links. */
function MailText({ text }: { readonly text: string }) {
  const parts = text.split(/(https?:\/\/[^\s<>]+)/g);
  return (
    <pre className="font-text break-words whitespace-pre-wrap">
      {parts.map((part, index) => {
        if (index % 2 === 0 || !URL.canParse(part)) return part;
        const { pathname, search } = new URL(part);
        return (
          <a key={index} className={LINK_CLASSES} href={`${pathname}${search}`}>
            {part}
          </a>
        );
      })}
    </pre>
  );
}

/**
 * HTML as a mail program shows it: an origin of its own, no scripts, no forms, nothing fetched. Links may open a
 * page beside this one.
 */
function MailFrame({ title, html }: { readonly title: string; readonly html: string }) {
  return (
    <iframe
      title={`HTML of “${title}”`}
      sandbox="allow-popups allow-popups-to-escape-sandbox"
      referrerPolicy="no-referrer"
      className="h-[32rem] w-full rounded-md border bg-white"
      srcDoc={html}
    />
  );
}

function Message({ id }: { readonly id: string }) {
  const mail = useQuery({ queryKey: ['demo-mail', id], queryFn: () => fetchMail(id) });
  const [view, setView] = useState<'text' | 'html'>('text');
  if (mail.isPending) return <LoadingState label="Opening the message…" />;
  if (mail.isError) return <ErrorState error={mail.error} />;
  return (
    <article className="grid content-start gap-3 p-5">
      <h2 className="text-xl">{mail.data.subject}</h2>
      <p className="text-sm text-muted">
        from {mail.data.from} to {mail.data.to}, {formatDayAndTime(mail.data.receivedAt)}
      </p>
      <div role="group" aria-label="Show as" className="flex flex-wrap items-center gap-1.5">
        {(['text', 'html'] as const).map((one) => (
          <Button
            key={one}
            size="small"
            aria-pressed={view === one}
            look={view === one ? 'plain' : 'quiet'}
            onClick={() => setView(one)}
          >
            {one === 'text' ? 'Plain text' : 'HTML'}
          </Button>
        ))}
        {mail.data.unsubscribeUrl ? (
          <span className="text-sm text-muted">with a one-click header to unsubscribe</span>
        ) : null}
      </div>
      {view === 'text' ? (
        <MailText text={mail.data.text} />
      ) : (
        <MailFrame title={mail.data.subject} html={mail.data.html} />
      )}
    </article>
  );
}

export default function MailPage() {
  const list = useQuery({ queryKey: ['demo-mail'], queryFn: fetchMailList, refetchInterval: 3_000 });
  const [chosen, setChosen] = useState<string | null>(null);
  if (list.isPending) return <LoadingState label="Reading the mail…" />;
  if (list.isError) return <ErrorState error={list.error} />;
  const messages = list.data.messages;
  if (messages.length === 0) {
    return (
      <PageState title="No mail yet">
        Messages that the demo sends are kept here instead of going out.
      </PageState>
    );
  }
  const open = chosen ?? messages[0]?.id ?? null;
  return (
    <div className="mx-auto grid max-w-5xl gap-4 px-4 py-8">
      <h1 className="text-3xl">Mail of the demo</h1>
      <div className="grid min-h-80 overflow-hidden rounded-lg border bg-raised md:grid-cols-[18rem_1fr]">
        <ul className="divide-y border-b md:border-r md:border-b-0">
          {messages.map((message) => (
            <li key={message.id}>
              <button
                type="button"
                aria-current={message.id === open}
                className={joinClasses(
                  'grid w-full px-4 py-2.5 text-left hover:bg-panel',
                  message.id === open && 'bg-panel',
                )}
                onClick={() => setChosen(message.id)}
              >
                <span className="truncate font-medium">{message.subject}</span>
                <span className="truncate text-sm text-muted">{message.to}</span>
              </button>
            </li>
          ))}
        </ul>
        {open ? <Message key={open} id={open} /> : null}
      </div>
    </div>
  );
}
