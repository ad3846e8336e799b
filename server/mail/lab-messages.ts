import type { Role } from '@/contract/rights';

import type { MailContent } from '../models/mail-message';

const day = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'long',
  year: 'numeric',
  timeZone: 'UTC',
});

interface InvitationWords {
  readonly labName: string;
  readonly inviter: string;
  readonly role: Role;
  readonly expiresAt: Date;
  readonly url: string;
}

/** To an address that may or may not have an account: the words are the same. */
export function invitationMessage({ labName, inviter, role, expiresAt, url }: InvitationWords): MailContent {
  return {
    subject: `${inviter} invites you to ${labName}`,
    name: '',
    passages: [
      {
        text:
          `${inviter} asks you to join the lab “${labName}” on Moiety, a workbench for structured populations, ` +
          `as a ${role}.`,
      },
      { label: 'Read the invitation', url },
      {
        text:
          `It stands until the end of ${day.format(expiresAt)} and is for this address alone. ` +
          'Nothing happens unless you accept it.',
      },
    ],
  };
}

/** To the invited address, when someone whose account has another wants to accept. */
export function confirmAddressMessage(personName: string, labName: string, url: string): MailContent {
  return {
    subject: `Is this address yours, ${personName}?`,
    name: '',
    passages: [
      {
        text: `${personName} is signed in to Moiety under another address and wants to accept the invitation to “${labName}” that came to this one. If that is you, open this link where you are signed in.`,
      },
      { label: 'Accept with my account', url },
      { text: 'If it is not you, ignore this message: nobody joins without the link.' },
    ],
  };
}

const labPage = (publicUrl: string, labId: string) => `${publicUrl}/lab?in=${encodeURIComponent(labId)}`;

export function roleChangedMessage(
  name: string,
  lab: { id: string; name: string },
  by: string,
  role: Role,
  publicUrl: string,
): MailContent {
  return {
    subject: `You are now a ${role} in ${lab.name}`,
    name,
    passages: [
      { text: `${by} changed your role in “${lab.name}” to ${role}.` },
      { label: 'See what your role may do', url: labPage(publicUrl, lab.id) },
    ],
  };
}

export function removedMessage(name: string, labName: string, by: string, copies: number): MailContent {
  const kept =
    copies === 0
      ? 'Your own presets stay yours.'
      : 'The presets that you had opened to the lab stay with it; you keep a private copy of each, as it was last saved.';
  return {
    subject: `You are no longer in ${labName}`,
    name,
    passages: [{ text: `${by} removed you from “${labName}”.` }, { text: kept }],
  };
}

/** News of people, for those who supervise them. */
export function peopleMessage(
  name: string,
  lab: { id: string; name: string },
  news: string,
  publicUrl: string,
): MailContent {
  return {
    subject: news,
    name,
    passages: [{ label: `People of ${lab.name}`, url: labPage(publicUrl, lab.id) }],
  };
}
