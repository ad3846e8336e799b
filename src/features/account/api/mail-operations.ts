import { mailSettingsSchema, subscriptionSchema, type ChangeMailSettings } from '@/contract/mail';
import { api } from '@/lib/api-client';

const withToken = (path: string, token: string) => `${path}?token=${encodeURIComponent(token)}`;

/** The calls about what is mailed, one each. */
export const fetchMailSettings = () => api.get('/account/mail', mailSettingsSchema);
export const changeMailSettings = (change: Partial<ChangeMailSettings>) =>
  api.patch('/account/mail', change, mailSettingsSchema);
export const fetchSubscription = (token: string) =>
  api.get(withToken('/mail/subscription', token), subscriptionSchema);
export const unsubscribe = (token: string) =>
  api.post(withToken('/mail/unsubscribe', token), {}, subscriptionSchema);
export const subscribeAgain = (token: string) =>
  api.post(withToken('/mail/subscribe-again', token), {}, subscriptionSchema);
