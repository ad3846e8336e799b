import type { MailContent } from '../models/mail-message';

interface About {
  readonly id: string;
  readonly title: string;
  readonly labName: string;
  readonly dueAt: Date | null;
  readonly timeZone: string;
}

function due({ dueAt, timeZone }: About): string {
  if (dueAt === null) return '';
  return new Intl.DateTimeFormat('en-GB', {
    weekday: 'long',
    day: 'numeric',
    month: 'long',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    timeZone,
    timeZoneName: 'short',
  }).format(dueAt);
}

const taskPage = (publicUrl: string, { id }: About) => `${publicUrl}/assigned/${encodeURIComponent(id)}`;

export function setForYouMessage(name: string, by: string, about: About, publicUrl: string): MailContent {
  return {
    subject: `A sweep for you: ${about.title}`,
    name,
    passages: [
      {
        text: `${by} set the sweep “${about.title}” for you in “${about.labName}”. It is due ${due(about)}.`,
      },
      { label: 'Read what is asked', url: taskPage(publicUrl, about) },
    ],
  };
}

export function dueSoonMessage(name: string, about: About, publicUrl: string): MailContent {
  return {
    subject: `Due within a day: ${about.title}`,
    name,
    passages: [
      { text: `The sweep “${about.title}” is due ${due(about)}, and you have not handed it in yet.` },
      { label: 'Open it', url: taskPage(publicUrl, about) },
    ],
  };
}

export function receiptMessage(
  name: string,
  about: About,
  { number, code, late, at }: { number: number; code: string; late: boolean; at: Date },
  publicUrl: string,
): MailContent {
  return {
    subject: `Received: ${about.title}`,
    name,
    passages: [
      {
        text:
          `Hand-in ${number} of “${about.title}” was received at ${at.toISOString()}${late ? ', after the due date' : ''}. ` +
          `Its receipt is ${code}.`,
      },
      { label: 'Look at what you handed in', url: taskPage(publicUrl, about) },
    ],
  };
}

export function reviewedMessage(
  name: string,
  about: About,
  { by, outcome, note }: { by: string; outcome: 'agreed' | 'differs' | 'sent back'; note: string },
  publicUrl: string,
): MailContent {
  const words = {
    agreed: `${by} reviewed your hand-in of “${about.title}”: it agrees with the evidence.`,
    differs: `${by} reviewed your hand-in of “${about.title}”: it differs from the evidence.`,
    'sent back': `${by} sent your hand-in of “${about.title}” back to you.`,
  }[outcome];
  return {
    subject: outcome === 'sent back' ? `Sent back: ${about.title}` : `Reviewed: ${about.title}`,
    name,
    passages: [
      { text: words },
      ...(note ? [{ text: note }] : []),
      { label: 'Read the review', url: taskPage(publicUrl, about) },
    ],
  };
}

export function handedInMessage(
  name: string,
  about: About,
  { who, number, late, handInId }: { who: string; number: number; late: boolean; handInId: string },
  publicUrl: string,
): MailContent {
  return {
    subject: `${who} handed in ${about.title}${late ? ', late' : ''}`,
    name,
    passages: [
      {
        label: `Hand-in ${number} of ${who}`,
        url: `${publicUrl}/hand-ins/${encodeURIComponent(handInId)}`,
      },
    ],
  };
}
