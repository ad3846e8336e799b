import { LAB_RIGHTS, ROLES, roleMay, type LabRight, type Role } from '@/contract/rights';

/** What each role may do, with one's own marked. */
export function RoleRights({ role }: { readonly role: Role }) {
  const rights = Object.keys(LAB_RIGHTS) as LabRight[];
  return (
    <details className="rounded-lg border bg-raised">
      <summary className="cursor-pointer px-4 py-2.5 font-heading text-lg">What each role may do</summary>
      <div className="overflow-x-auto border-t" tabIndex={0} role="region" aria-label="Rights by role">
        <table className="w-full text-sm">
          <thead className="bg-panel text-left">
            <tr>
              <th scope="col" className="px-4 py-1.5 font-medium">
                Right
              </th>
              {ROLES.map((one) => (
                <th
                  key={one}
                  scope="col"
                  className={`px-3 py-1.5 ${one === role ? 'font-bold' : 'font-medium'}`}
                >
                  {one}
                  {one === role ? <span className="font-normal text-muted"> (you)</span> : null}
                </th>
              ))}
            </tr>
          </thead>
          <tbody className="divide-y">
            {rights.map((right) => (
              <tr key={right}>
                <th scope="row" className="px-4 py-1.5 text-left font-normal">
                  {right}
                </th>
                {ROLES.map((one) => (
                  <td
                    key={one}
                    className={`px-3 py-1.5 ${roleMay(one, right) ? 'text-accent' : 'text-muted'}`}
                  >
                    {roleMay(one, right) ? 'yes' : 'no'}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </details>
  );
}
