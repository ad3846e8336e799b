import { RailSection } from '../rail-section';
import { BoxFields } from './box-fields';
import { ConstantsOfMotion } from './constants-of-motion';
import { ModelFields } from './model-fields';

/** What is set once and seldom looked at again. */
export function MoreSection() {
  return (
    <RailSection name="more" title="Units, box and notes">
      <div className="grid gap-4">
        <ModelFields />
        <BoxFields />
        <ConstantsOfMotion />
      </div>
    </RailSection>
  );
}
