import { CircleAlert, TriangleAlert } from 'lucide-react';

import { placeInWords } from '@/engine/schema/migrate';
import { plural } from '@/lib/format';

import { useWorkbench } from '../state/store';
import { jumpToField, pathKey } from './rail-state';

/** What stands in the way of the model, at the top of the rail; choosing one goes to its field. */
export function ProblemsList() {
  const report = useWorkbench((state) => state.report);
  const hasShown = useWorkbench((state) => state.shownReport !== null);
  const problems = (report?.diagnostics ?? []).filter((one) => one.severity !== 'note');
  const errors = problems.filter((one) => one.severity === 'error').length;
  if (!report || problems.length === 0) return null;
  return (
    <section aria-label="Problems" className="border-b border-hairline bg-raised px-4 py-3">
      <p role="status" className="text-sm font-semibold text-caution">
        {errors > 0 ? plural(errors, 'problem') : plural(problems.length, 'remark')}
        {!report.valid && hasShown ? (
          <span className="font-normal text-muted">. The plots show the last valid model.</span>
        ) : null}
      </p>
      <ul className="mt-1 max-h-40 overflow-y-auto" tabIndex={-1}>
        {problems.map((one) => {
          const Icon = one.severity === 'error' ? CircleAlert : TriangleAlert;
          return (
            <li key={`${pathKey(one.path)}:${one.message}`}>
              <button
                type="button"
                className="flex w-full items-start gap-1.5 rounded px-1 py-1 text-left text-sm leading-snug hover:bg-panel"
                onClick={() => jumpToField(one.path)}
              >
                <Icon
                  size={14}
                  role="img"
                  aria-label={one.severity === 'error' ? 'Error' : 'Warning'}
                  className="mt-0.5 shrink-0 text-caution"
                />
                <span>
                  <span className="text-muted">{placeInWords(one.path)}: </span>
                  {one.message}
                </span>
              </button>
            </li>
          );
        })}
      </ul>
    </section>
  );
}
