import { invitationSchema, joinedSchema } from '@/contract/labs';
import { api } from '@/lib/api-client';

const invitation = (token: string) => `/invitations/${encodeURIComponent(token)}`;

/** The calls of the page that a mailed invitation opens, one each. */
export const fetchInvitation = (token: string) => api.get(invitation(token), invitationSchema);
export const acceptInvitation = (token: string) => api.post(`${invitation(token)}/accept`, {}, joinedSchema);
export const declineInvitation = (token: string) => api.postOnly(`${invitation(token)}/decline`, {});
export const askToConfirmAddress = (token: string) =>
  api.postOnly(`${invitation(token)}/confirm-address`, {});
export const signUpByInvitation = (token: string, body: { name: string; password: string }) =>
  api.postOnly(`${invitation(token)}/sign-up`, body);
