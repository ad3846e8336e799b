import type { InvitationBody, InvitationList, LabBody, OwnInvitations } from '@/contract/labs';
import { roleMay, type Role } from '@/contract/rights';

import type { Invitation } from '../models/invitation';
import type { MailState } from '../models/mail-message';

/** Made once: a comparison that reads its locale anew takes longer than reading the members. */
const byName = new Intl.Collator();

/** A member as the file has them. */
export interface MemberRow {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly role: Role;
  readonly joinedAt: string | null;
}

/** A lab as a member of some role sees it; addresses are for those who may invite. */
export function presentLab(
  lab: { id: string; name: string },
  role: Role,
  members: readonly MemberRow[],
): LabBody {
  const showAddresses = roleMay(role, 'invite members');
  return {
    id: lab.id,
    name: lab.name,
    role,
    members: members
      .map(({ joinedAt, email, ...one }) => ({
        ...one,
        email: showAddresses ? email : null,
        joinedAt: joinedAt === null ? null : new Date(joinedAt).toISOString(),
      }))
      .sort((a, b) => byName.compare(a.name, b.name)),
  };
}

/** Who invited; they may have deleted their account since. */
const inviterName = ({ inviter }: Invitation) => inviter?.name ?? 'A supervisor';

function stateOf({ declinedAt, expiresAt }: Invitation): 'open' | 'expired' | 'declined' {
  if (declinedAt !== null) return 'declined';
  return expiresAt > new Date() ? 'open' : 'expired';
}

export function presentInvitations(
  invitations: readonly Invitation[],
  mailOf: (invitation: Invitation) => MailState | undefined,
): InvitationList {
  return {
    invitations: invitations.map((one) => ({
      id: one.id,
      email: one.email,
      role: one.role,
      state: stateOf(one),
      invitedBy: inviterName(one),
      createdAt: one.createdAt.toISOString(),
      expiresAt: one.expiresAt.toISOString(),
      mail: mailOf(one) ?? 'unknown',
    })),
  };
}

export function presentInvitation(invitation: Invitation, mine: boolean): InvitationBody {
  return {
    labName: invitation.lab?.name ?? '',
    role: invitation.role,
    invitedBy: inviterName(invitation),
    email: invitation.email,
    expiresAt: invitation.expiresAt.toISOString(),
    mine,
  };
}

export function presentOwnInvitations(invitations: readonly Invitation[]): OwnInvitations {
  return {
    invitations: invitations.map((one) => ({
      id: one.id,
      labName: one.lab?.name ?? '',
      role: one.role,
      invitedBy: inviterName(one),
      expiresAt: one.expiresAt.toISOString(),
    })),
  };
}
