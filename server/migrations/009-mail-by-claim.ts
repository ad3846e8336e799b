import type { Migration } from './migration';

/** What is being sent, found by the claim that it goes out under. */
export const mailByClaim: Migration = {
  name: '009-mail-by-claim',
  up: ['CREATE INDEX mail_messages_by_claim ON mail_messages (claim) WHERE claim IS NOT NULL'],
  down: ['DROP INDEX mail_messages_by_claim'],
};
