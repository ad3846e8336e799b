import { Check, TriangleAlert } from 'lucide-react';

import { ROW_PROBLEMS, type InvitationPreview } from '@/contract/labs';

/** What became of each row, in the order in which they stood. */
export function PreviewTable({ preview }: { readonly preview: InvitationPreview }) {
  return (
    <div
      className="max-h-[50dvh] overflow-auto rounded-md border"
      tabIndex={0}
      role="region"
      aria-label="Rows"
    >
      <table className="w-full text-left text-sm">
        <thead className="sticky top-0 bg-panel">
          <tr>
            <th scope="col" className="px-3 py-1.5 font-medium">
              Row
            </th>
            <th scope="col" className="px-3 py-1.5 font-medium">
              Address
            </th>
            <th scope="col" className="px-3 py-1.5 font-medium">
              Role
            </th>
            <th scope="col" className="px-3 py-1.5 font-medium">
              State
            </th>
          </tr>
        </thead>
        <tbody className="divide-y">
          {preview.rows.map((row, index) => (
            <tr key={index} className={row.problem ? 'bg-panel/50' : ''}>
              <td className="figures px-3 py-1.5 align-top text-muted">{row.line}</td>
              <td className="px-3 py-1.5 align-top break-all">
                {row.email || <span className="text-muted">empty</span>}
              </td>
              <td className="px-3 py-1.5 align-top">{row.role}</td>
              <td className="px-3 py-1.5 align-top">
                {row.problem ? (
                  <span className="flex items-start gap-1.5 text-caution">
                    <TriangleAlert size={14} className="mt-0.5 shrink-0" aria-hidden />
                    {ROW_PROBLEMS[row.problem]}
                  </span>
                ) : (
                  <span className="flex items-start gap-1.5 text-accent">
                    <Check size={14} className="mt-0.5 shrink-0" aria-hidden />
                    ready
                  </span>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
