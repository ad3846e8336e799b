import { useParams } from 'react-router-dom';

import WorkbenchPage from '@/features/workbench/workbench-page';

/** The workbench fills the window and has its own header; it is a chunk of its own. */
export function WorkbenchRoute({ kind }: { readonly kind: 'new' | 'preset' | 'shared' }) {
  const { id = '', token = '' } = useParams();
  const source = kind === 'new' ? { kind } : kind === 'preset' ? { kind, id } : { kind, token };
  return <WorkbenchPage key={`${kind}:${id}${token}`} source={source} />;
}
