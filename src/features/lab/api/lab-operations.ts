import { auditPageSchema } from '@/contract/audit';
import {
  departureSchema,
  invitationListSchema,
  invitationPreviewSchema,
  joinedSchema,
  labSchema,
  ownInvitationsSchema,
  type InvitationRow,
} from '@/contract/labs';
import type { Role } from '@/contract/rights';
import { api } from '@/lib/api-client';

const lab = (labId: string) => `/labs/${encodeURIComponent(labId)}`;
const member = (labId: string, userId: string) => `${lab(labId)}/members/${encodeURIComponent(userId)}`;
const invitation = (labId: string, id: string) => `${lab(labId)}/invitations/${encodeURIComponent(id)}`;
const mine = (id: string) => `/account/invitations/${encodeURIComponent(id)}`;

export const LAB_KEYS = {
  lab: (labId: string) => ['lab', labId],
  invitations: (labId: string) => ['lab', labId, 'invitations'],
  departure: (labId: string, userId: string) => ['lab', labId, 'departure', userId],
  history: (labId: string, query: string) => ['lab', labId, 'history', query],
  own: ['own-invitations'],
} as const;

/** The calls of the page of labs, one each. */
export const fetchLab = (labId: string) => api.get(lab(labId), labSchema);
export const createLab = (name: string) => api.post('/labs', { name }, labSchema);
export const renameLab = (labId: string, name: string) => api.patch(lab(labId), { name }, labSchema);
export const changeRole = (labId: string, userId: string, role: Role) =>
  api.patch(member(labId, userId), { role }, labSchema);
export const fetchDeparture = (labId: string, userId: string) =>
  api.get(`${member(labId, userId)}/departure`, departureSchema);
export const endMembership = (labId: string, userId: string) => api.delete(member(labId, userId));

export const fetchInvitations = (labId: string) => api.get(`${lab(labId)}/invitations`, invitationListSchema);
export const previewInvitations = (labId: string, body: { rows: readonly InvitationRow[]; role: Role }) =>
  api.post(`${lab(labId)}/invitations/preview`, body, invitationPreviewSchema);
export const invite = (
  labId: string,
  body: { invitations: readonly { email: string; role: string }[]; days: number },
) => api.post(`${lab(labId)}/invitations`, body, invitationListSchema);
export const resendInvitation = (labId: string, id: string) =>
  api.post(`${invitation(labId, id)}/resend`, {}, invitationListSchema);
export const withdrawInvitation = (labId: string, id: string) => api.delete(invitation(labId, id));

export const fetchHistory = (labId: string, query: string) =>
  api.get(`${lab(labId)}/audit?${query}`, auditPageSchema);
/** Where the same history is to be had as a file. */
export const historyFile = (labId: string, query: string) => `/api${lab(labId)}/audit.csv?${query}`;

/** Where everything that the lab owns is to be had as one file. */
export const labArchive = (labId: string) => `/api${lab(labId)}/export.zip`;

export const fetchOwnInvitations = () => api.get('/account/invitations', ownInvitationsSchema);
export const acceptOwnInvitation = (id: string) => api.post(`${mine(id)}/accept`, {}, joinedSchema);
export const declineOwnInvitation = (id: string) => api.postOnly(`${mine(id)}/decline`, {});
