import { Plus } from 'lucide-react';

import { Button } from '@/components/ui/button';
import { addPopulation } from '@/engine/schema/edit';
import { LIMITS } from '@/engine/schema/limits';

import { useWorkbench } from '../../state/store';
import { RailSection } from '../rail-section';
import { PopulationCard } from './population-card';

export function PopulationSection() {
  const count = useWorkbench((state) => state.document.populations.length);
  const densityUnit = useWorkbench((state) => state.document.densityUnit);
  const edit = useWorkbench((state) => state.edit);
  return (
    <RailSection
      name="populations"
      title="Populations"
      aside={densityUnit ? `start values, ${densityUnit}` : 'start values'}
      actions={
        <Button
          look="quiet"
          size="small"
          aria-label="Add population"
          disabled={count >= LIMITS.populations}
          onClick={() => edit('Add population', (document) => addPopulation(document, '', 'N'))}
        >
          <Plus size={14} aria-hidden /> Population
        </Button>
      }
    >
      <ul className="grid gap-3">
        {Array.from({ length: count }, (_, index) => (
          <PopulationCard key={index} index={index} />
        ))}
      </ul>
    </RailSection>
  );
}
