import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';

import { SelectField } from '@/components/fields/select-field';
import { Button, buttonClasses } from '@/components/ui/button';
import type { LabBody } from '@/contract/labs';
import { roleMay } from '@/contract/rights';
import { useRefreshSession } from '@/lib/session';

import { LAB_KEYS, labArchive, renameLab } from '../api/lab-operations';
import { useCurrentLab } from '../use-current-lab';
import { NameDialog } from './name-dialog';

interface LabHeadingProps {
  readonly lab: LabBody;
  readonly onNew: () => void;
  readonly onLeave: () => void;
}

/** Which lab this is, the way to the others, and what can be done with it as a whole. */
export function LabHeading({ lab, onNew, onLeave }: LabHeadingProps) {
  const { memberships, choose } = useCurrentLab();
  const queries = useQueryClient();
  const refresh = useRefreshSession();
  const [renaming, setRenaming] = useState(false);

  const handleRename = async (name: string) => {
    queries.setQueryData(LAB_KEYS.lab(lab.id), await renameLab(lab.id, name));
    await refresh();
  };

  return (
    <div className="flex flex-wrap items-end justify-between gap-x-6 gap-y-3">
      <div className="min-w-0">
        <h1 className="text-3xl break-words">{lab.name}</h1>
        <p className="text-muted">You are a {lab.role} here.</p>
      </div>
      <div className="flex flex-wrap items-end gap-2">
        {memberships.length > 1 ? (
          <SelectField
            label="Lab"
            visibleLabel={false}
            className="w-52"
            value={lab.id}
            choices={memberships.map(({ labId, labName }) => ({ value: labId, label: labName }))}
            onChange={choose}
          />
        ) : null}
        {roleMay(lab.role, 'rename the lab') ? (
          <Button onClick={() => setRenaming(true)}>Rename</Button>
        ) : null}
        {roleMay(lab.role, 'view lab history') ? (
          <Link to={`/lab/history?in=${encodeURIComponent(lab.id)}`} className={buttonClasses('plain')}>
            History
          </Link>
        ) : null}
        {roleMay(lab.role, 'export the lab') ? (
          <a href={labArchive(lab.id)} className={buttonClasses('plain')}>
            Export
          </a>
        ) : null}
        <Button onClick={onLeave}>Leave</Button>
        <Button onClick={onNew}>New lab</Button>
      </div>
      {renaming ? (
        <NameDialog
          title="Rename the lab"
          description="Members and open invitations see the new name at once."
          initial={lab.name}
          submitLabel="Rename"
          onSubmit={handleRename}
          onClose={() => setRenaming(false)}
        />
      ) : null}
    </div>
  );
}
