import { LabSweeps } from '@/features/assigned/list/lab-sweeps';
import LabPage from '@/features/lab/lab-page';

/** A lab, with its assigned sweeps. */
export default function LabRoute() {
  return <LabPage sweeps={(labId, role) => <LabSweeps labId={labId} role={role} />} />;
}
