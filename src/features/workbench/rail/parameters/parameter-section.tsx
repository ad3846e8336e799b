import { Plus } from 'lucide-react';
import { Component, type ReactNode } from 'react';

import { Button } from '@/components/ui/button';
import { LIMITS } from '@/engine/schema/limits';
import { part } from '@/lib/part';
import { whenIdle } from '@/lib/when-idle';

import { isModelLocked } from '../../state/assigned';
import { useWorkbench } from '../../state/store';
import { RailSection } from '../rail-section';
import { addParameter } from './parameter-edits';
import { ParameterRow } from './parameter-row';

const LevaParameters = part(() => whenIdle().then(() => import('./leva-parameters')));

function PlainParameters() {
  const count = useWorkbench((state) => state.document.parameters.length);
  return Array.from({ length: count }, (_, index) => <ParameterRow key={index} index={index} />);
}

/** Rows that are about to be replaced must not take a keystroke. */
function AwaitedParameters() {
  return (
    <fieldset disabled>
      <PlainParameters />
    </fieldset>
  );
}

/** The same rows without leva, should it fail to load or to run. */
class Fallback extends Component<{ readonly children: ReactNode }, { readonly failed: boolean }> {
  override state = { failed: false };
  static getDerivedStateFromError() {
    return { failed: true };
  }
  override render() {
    return this.state.failed ? <PlainParameters /> : this.props.children;
  }
}

export function ParameterSection() {
  const count = useWorkbench((state) => state.document.parameters.length);
  const edit = useWorkbench((state) => state.edit);
  const locked = useWorkbench((state) => isModelLocked(state.assigned));
  // The first picture goes before the sliders.
  const pictured = useWorkbench((state) => state.result !== null || state.report?.valid === false);
  return (
    <RailSection
      name="parameters"
      title="Parameters"
      aside={count > 0 ? 'drag or type' : null}
      actions={
        <Button
          look="quiet"
          size="small"
          disabled={count >= LIMITS.parameters || locked}
          onClick={() => edit('Add parameter', (document) => addParameter(document, 'p', ''))}
        >
          <Plus size={14} aria-hidden /> Parameter
        </Button>
      }
    >
      {count === 0 ? (
        <p className="text-sm text-muted">
          No parameters yet. Processes from templates bring theirs; others are added here.
        </p>
      ) : (
        <Fallback>
          {pictured ? <LevaParameters fallback={<AwaitedParameters />} /> : <AwaitedParameters />}
        </Fallback>
      )}
    </RailSection>
  );
}
