import { SelectField } from '@/components/fields/select-field';
import { Button } from '@/components/ui/button';
import type { LabBody } from '@/contract/labs';
import { ROLES, roleMay, rolesThatMay, type Role } from '@/contract/rights';
import { formatDay } from '@/lib/format';

type Member = LabBody['members'][number];

interface MemberRowProps {
  readonly lab: LabBody;
  readonly member: Member;
  readonly isMe: boolean;
  readonly busy: boolean;
  readonly onRole: (role: Role) => void;
  readonly onRemove: () => void;
}

const CHOICES = ROLES.map((role) => ({ value: role, label: role }));
const KEEPERS = rolesThatMay('change roles');

/** Why a member's role cannot be given up now; null where it can. */
function obstacle(lab: LabBody, member: Member): string | null {
  const keepers = lab.members.filter(({ role }) => KEEPERS.includes(role));
  return keepers.length === 1 && keepers[0]?.id === member.id
    ? 'The only supervisor: a lab always keeps one.'
    : null;
}

/** A member, with what the reader may do about them; what cannot be done says why. */
export function MemberRow({ lab, member, isMe, busy, onRole, onRemove }: MemberRowProps) {
  const reason = obstacle(lab, member);
  const note = `${member.id}-note`;
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_auto] items-center gap-x-4 gap-y-1 px-4 py-2.5 sm:grid-cols-[minmax(0,1fr)_11rem_5.5rem]">
      <div className="min-w-0">
        <p className="truncate">
          {member.name}
          {isMe ? <span className="text-muted"> (you)</span> : null}
        </p>
        <p className="truncate text-sm text-muted">
          {[member.email, member.joinedAt ? `joined ${formatDay(member.joinedAt)}` : null]
            .filter(Boolean)
            .join(', ')}
        </p>
      </div>
      {roleMay(lab.role, 'change roles') ? (
        <SelectField
          label={`Role of ${member.name}`}
          visibleLabel={false}
          value={member.role}
          choices={CHOICES}
          disabled={busy || reason !== null}
          onChange={onRole}
        />
      ) : (
        <span className="text-muted">{member.role}</span>
      )}
      {roleMay(lab.role, 'remove members') && !isMe ? (
        <Button
          size="small"
          className="max-sm:col-start-2 max-sm:justify-self-end"
          aria-label={`Remove ${member.name}`}
          aria-describedby={reason ? note : undefined}
          disabled={busy || reason !== null}
          onClick={onRemove}
        >
          Remove…
        </Button>
      ) : null}
      {reason && roleMay(lab.role, 'change roles') ? (
        <p id={note} className="col-span-full text-sm text-muted">
          {reason}
        </p>
      ) : null}
    </li>
  );
}
