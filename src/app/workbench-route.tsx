import { useParams } from 'react-router-dom';

import WorkbenchPage, { type WorkbenchSource } from '@/features/workbench/workbench-page';

/** The workbench fills the window and has its own header; it is a chunk of its own. */
export function WorkbenchRoute({ kind }: { readonly kind: WorkbenchSource['kind'] }) {
  const { id = '', token = '' } = useParams();
  const source: WorkbenchSource =
    kind === 'new' ? { kind } : kind === 'shared' ? { kind, token } : { kind, id };
  return <WorkbenchPage key={`${kind}:${id}${token}`} source={source} />;
}
