import type { Message } from './mailer';

const SIGNATURE = '-- \nMoiety, a workbench for structured populations';

function compose(to: string, subject: string, paragraphs: readonly string[]): Message {
  return { to, subject, text: [...paragraphs, SIGNATURE].join('\n\n') + '\n' };
}

/** To a new address after a sign-up. */
export function confirmationMessage(to: string, name: string, publicUrl: string, token: string): Message {
  return compose(to, 'Confirm your Moiety account', [
    `Hello ${name},`,
    'an account was asked for with this e-mail address. To confirm it and sign in, open this link:',
    `${publicUrl}/confirm?token=${token}`,
    'It works once, within two days. If you did not sign up, do not open the link: no account is made without it.',
  ]);
}

/** To an address that already has an account, after a sign-up. */
export function knownAddressMessage(to: string, name: string, publicUrl: string): Message {
  return compose(to, 'You already have a Moiety account', [
    `Hello ${name},`,
    'someone, perhaps you, tried to sign up with this e-mail address, which has an account already. ' +
      'Nothing was changed.',
    `You can sign in here:\n${publicUrl}/sign-in`,
    `Should the password have slipped your mind, ask for a new one here:\n${publicUrl}/forgotten`,
  ]);
}

/** To a known address after a forgotten password. */
export function resetMessage(to: string, name: string, publicUrl: string, token: string): Message {
  return compose(to, 'Choose a new password for Moiety', [
    `Hello ${name},`,
    'a new password was asked for. To choose one, open this link:',
    `${publicUrl}/reset?token=${token}`,
    'It works once, within an hour, and choosing a password signs you out everywhere. ' +
      'If you did not ask, ignore this message: your password stays as it is.',
  ]);
}

/** To the account holder after the password has changed. */
export function passwordChangedMessage(to: string, name: string, publicUrl: string): Message {
  return compose(to, 'Your Moiety password was changed', [
    `Hello ${name},`,
    'the password of your account was changed, and other sessions were ended.',
    `If that was not you, ask for a new password at once:\n${publicUrl}/forgotten`,
  ]);
}
