import { compareDocuments, DIFFERENCE_SECTIONS } from './compare-documents';
import type { PresetDocument } from '@/engine/schema/preset';

interface DifferenceTableProps {
  readonly before: PresetDocument;
  readonly after: PresetDocument;
  readonly beforeName: string;
  readonly afterName: string;
}

function Side({ value }: { readonly value: string | null }) {
  return value === null ? (
    <span className="text-muted">not there</span>
  ) : (
    <span className="figures break-words">{value}</span>
  );
}

/** Two documents side by side, only where they differ. */
export function DifferenceTable({ before, after, beforeName, afterName }: DifferenceTableProps) {
  const all = compareDocuments(before, after);
  if (all.length === 0) return <p className="text-muted">These two do not differ.</p>;
  return (
    <div className="max-h-[55vh] overflow-auto" role="region" aria-label="Differences" tabIndex={0}>
      <table className="w-full table-fixed border-collapse text-sm">
        <thead className="sticky top-0 bg-raised">
          <tr className="border-b border-hairline text-left">
            <th scope="col" className="w-1/3 py-1.5 pr-3 font-medium">
              What differs
            </th>
            <th scope="col" className="py-1.5 pr-3 font-medium">
              {beforeName}
            </th>
            <th scope="col" className="py-1.5 font-medium">
              {afterName}
            </th>
          </tr>
        </thead>
        {DIFFERENCE_SECTIONS.map((section) => {
          const rows = all.filter((one) => one.section === section);
          if (rows.length === 0) return null;
          return (
            <tbody key={section}>
              <tr>
                <th
                  scope="rowgroup"
                  colSpan={3}
                  className="pt-3 pb-1 text-left font-heading text-base font-semibold"
                >
                  {section}
                </th>
              </tr>
              {rows.map((row) => (
                <tr key={row.label} className="border-t border-hairline align-top">
                  <th scope="row" className="py-1 pr-3 text-left font-normal break-words">
                    {row.label}
                  </th>
                  <td className="py-1 pr-3">
                    <Side value={row.before} />
                  </td>
                  <td className="py-1">
                    <Side value={row.after} />
                  </td>
                </tr>
              ))}
            </tbody>
          );
        })}
      </table>
    </div>
  );
}
