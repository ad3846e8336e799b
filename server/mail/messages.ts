import type { MailContent } from '../models/mail-message';

/** To a new address after a sign-up. */
export function confirmationMessage(name: string, publicUrl: string, token: string): MailContent {
  return {
    subject: 'Confirm your Moiety account',
    name,
    passages: [
      { text: 'An account was asked for with this e-mail address.' },
      { label: 'Confirm it and sign in', url: `${publicUrl}/confirm?token=${token}` },
      {
        text: 'The link works once, within two days. If you did not sign up, do not open it: no account is made without it.',
      },
    ],
  };
}

/** To an address that already has an account, after a sign-up. */
export function knownAddressMessage(name: string, publicUrl: string): MailContent {
  return {
    subject: 'You already have a Moiety account',
    name,
    passages: [
      {
        text:
          'Someone, perhaps you, tried to sign up with this e-mail address, which has an account already. ' +
          'Nothing was changed.',
      },
      { label: 'Sign in', url: `${publicUrl}/sign-in` },
      { text: 'Should the password have slipped your mind, ask for a new one.' },
      { label: 'Ask for a new password', url: `${publicUrl}/forgotten` },
    ],
  };
}

/** To a known address after a forgotten password. */
export function resetMessage(name: string, publicUrl: string, token: string): MailContent {
  return {
    subject: 'Choose a new password for Moiety',
    name,
    passages: [
      { text: 'A new password was asked for.' },
      { label: 'Choose a new password', url: `${publicUrl}/reset?token=${token}` },
      {
        text:
          'The link works once, within an hour, and choosing a password signs you out everywhere. ' +
          'If you did not ask, ignore this message: your password stays as it is.',
      },
    ],
  };
}

/** To the account holder after the password has changed. */
export function passwordChangedMessage(name: string, publicUrl: string): MailContent {
  return {
    subject: 'Your Moiety password was changed',
    name,
    passages: [
      {
        text: 'The password of your account was changed, and other sessions were ended. If that was not you, ask for a new password at once.',
      },
      { label: 'Ask for a new password', url: `${publicUrl}/forgotten` },
    ],
  };
}

/** To the former address of an account, after it was deleted. */
export function accountDeletedMessage(name: string): MailContent {
  return {
    subject: 'Your Moiety account was deleted',
    name,
    passages: [
      {
        text:
          'Your account and the presets that only you could see were deleted. What you opened to labs and handed in ' +
          'there stays with them. Nobody can sign in by this address any more, and a new account can be made with it.',
      },
      {
        text: 'If it was not you, tell whoever runs this server without delay: for 30 days the presets can still be found.',
      },
    ],
  };
}
