import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { useLocation } from 'react-router-dom';

import { SelectField } from '@/components/fields/select-field';
import { ErrorState, LoadingState } from '@/components/states/page-state';
import { Button } from '@/components/ui/button';
import { MAIL_KIND_NAMES, mailRule, type MailTiming } from '@/contract/mail';

import { changeMailSettings, fetchMailSettings } from '../api/mail-operations';

const KEY = ['account-mail'];
const TIMING_WORDS: Readonly<Record<MailTiming, string>> = {
  'at once': 'at once',
  daily: 'once a day',
  off: 'not at all',
};
const HOURS = Array.from({ length: 24 }, (_one, hour) => ({
  value: String(hour),
  label: `${String(hour).padStart(2, '0')}:00`,
}));

/** Which mail comes, and when. A choice holds as soon as it is made. */
export function MailSettings() {
  const queries = useQueryClient();
  const settings = useQuery({ queryKey: KEY, queryFn: fetchMailSettings });
  const change = useMutation({
    mutationFn: changeMailSettings,
    onSuccess: (fresh) => queries.setQueryData(KEY, fresh),
  });
  const { hash } = useLocation();
  const heading = useRef<HTMLHeadingElement>(null);
  const shown = settings.isSuccess;
  // Messages link here; the section is there only once it has been read.
  useEffect(() => {
    if (shown && hash === '#mail') heading.current?.scrollIntoView();
  }, [shown, hash]);
  if (settings.isPending) return <LoadingState label="Reading what is mailed to you…" />;
  if (settings.isError) return <ErrorState error={settings.error} />;
  const { timings, digestHour, timeZone } = settings.data;
  const here = Intl.DateTimeFormat().resolvedOptions().timeZone;
  return (
    <section aria-labelledby="mail-heading" className="grid gap-3">
      <div className="flex flex-wrap items-baseline justify-between gap-x-4">
        <h2 id="mail-heading" ref={heading} className="scroll-mt-6 text-xl">
          Mail
        </h2>
        <p role="status" className="text-sm text-accent">
          {change.isSuccess ? 'Saved.' : ''}
        </p>
      </div>
      {change.error ? (
        <p role="alert" className="text-caution">
          {change.error.message}
        </p>
      ) : null}
      <ul className="divide-y rounded-lg border bg-raised">
        {MAIL_KIND_NAMES.map((kind) => {
          const { label, help, timings: choices } = mailRule(kind);
          return (
            <li
              key={kind}
              className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1.5 px-4 py-2.5"
            >
              <div className="min-w-0 flex-1 basis-64">
                <p>{label}</p>
                <p className="text-sm text-muted">{help}</p>
              </div>
              {choices.length > 1 ? (
                <SelectField
                  label={label}
                  visibleLabel={false}
                  className="w-36"
                  value={timings[kind]}
                  choices={choices.map((value) => ({ value, label: TIMING_WORDS[value] }))}
                  disabled={change.isPending}
                  onChange={(timing) => change.mutate({ timings: { [kind]: timing } })}
                />
              ) : (
                <span className="w-36 text-muted">always, at once</span>
              )}
            </li>
          );
        })}
      </ul>
      <div className="flex flex-wrap items-end gap-3">
        <SelectField
          label="What comes once a day comes at"
          className="w-56"
          value={String(digestHour)}
          choices={HOURS}
          disabled={change.isPending}
          onChange={(hour) => change.mutate({ digestHour: Number(hour) })}
        />
        <p className="pb-1 text-muted">by the clocks of {timeZone.replaceAll('_', ' ')}</p>
        {here === timeZone ? null : (
          <Button
            size="small"
            className="mb-0.5"
            disabled={change.isPending}
            onClick={() => change.mutate({ timeZone: here })}
          >
            Use {here.replaceAll('_', ' ')}
          </Button>
        )}
      </div>
    </section>
  );
}
