import { z } from '@/engine/schema/zod';

import { demoAccountsSchema, mailListSchema, mailSchema, sessionListSchema } from '@/contract/account';
import { deletionSchema } from '@/contract/account-deletion';
import { auditPageSchema } from '@/contract/audit';
import { api } from '@/lib/api-client';

/** The calls of the account pages, one each. */
export const signIn = (body: { email: string; password: string }) => api.postOnly('/session', body);
export const signUp = (body: { name: string; email: string; password: string }) =>
  api.postOnly('/accounts', body);
export const confirmAccount = (token: string) => api.postOnly('/accounts/confirm', { token });
export const askForReset = (body: { email: string }) => api.postOnly('/password/forgotten', body);
export const resetPassword = (body: { token: string; password: string }) =>
  api.postOnly('/password/reset', body);
export const changePassword = (body: { current: string; next: string }) =>
  api.postOnly('/password/change', body);
export const changeName = (name: string) => api.patch('/account', { name }, z.unknown());
export const fetchDeletion = () => api.get('/account/deletion', deletionSchema);
export const deleteAccount = (body: { password: string; anonymous: boolean }) =>
  api.postOnly('/account/deletion', body);
export const fetchSessions = () => api.get('/account/sessions', sessionListSchema);
export const fetchAccountEvents = (page: number) => api.get(`/account/audit?page=${page}`, auditPageSchema);
export const endSession = (id: string) => api.delete(`/account/sessions/${encodeURIComponent(id)}`);
export const endOtherSessions = () => api.delete('/account/sessions');
export const fetchDemoAccounts = () => api.get('/demo/accounts', demoAccountsSchema);
export const fetchMailList = () => api.get('/demo/mail', mailListSchema);
export const fetchMail = (id: string) => api.get(`/demo/mail/${encodeURIComponent(id)}`, mailSchema);
