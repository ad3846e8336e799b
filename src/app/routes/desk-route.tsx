import { AssignedToMe } from '@/features/assigned/list/assigned-to-me';
import DeskPage from '@/features/library/desk-page';

/** The desk, with what is set for its owner. */
export default function DeskRoute() {
  return <DeskPage assigned={<AssignedToMe />} />;
}
