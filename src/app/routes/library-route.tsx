import { SetSweepDialog } from '@/features/assigned/list/set-sweep-dialog';
import { useSettingLabs } from '@/features/assigned/list/use-setting-labs';
import LibraryPage from '@/features/library/library-page';

/** The library, where those who may set sweeps begin them. */
export default function LibraryRoute() {
  const sets = useSettingLabs().length > 0;
  return (
    <LibraryPage
      setSweep={sets ? (preset, onClose) => <SetSweepDialog preset={preset} onClose={onClose} /> : null}
    />
  );
}
