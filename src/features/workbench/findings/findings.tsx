import { useWorkbench } from '../state/store';
import { AssignedCard } from '../assigned/assigned-card';
import { CommentsCard } from '../comments/comments-card';
import { BranchesCard } from './branches-card';
import { CyclesCard } from './cycles-card';
import { DensityCard } from './density-card';
import { EquilibriaSection } from './equilibria-section';
import { ExponentsCard } from './exponents-card';
import { JobCard } from './job-card';
import { NotesCard } from './notes-card';
import { PictureCard } from './picture-card';
import { SecondOpinionCard } from './second-opinion-card';
import { SpecialPointsCard } from './special-points-card';
import { VerdictCard } from './verdict-card';

function EngineTrouble() {
  const error = useWorkbench((state) => state.engineError);
  if (!error) return null;
  return (
    <p role="alert" className="rounded-lg border border-caution bg-raised p-3.5 text-caution">
      {error}
    </p>
  );
}

function InvalidNote() {
  const invalid = useWorkbench((state) => state.report !== null && !state.report.valid);
  const shown = useWorkbench((state) => state.shownReport !== null);
  if (!invalid) return null;
  return (
    <p role="status" className="rounded-lg border border-caution bg-raised p-3.5">
      {shown
        ? 'The model has a mistake, marked in the model rail. What you see is the last valid model.'
        : 'The model cannot be computed yet. What is missing is marked in the model rail.'}
    </p>
  );
}

/** The right rail: verdict, equilibria, special points, notes. */
export function Findings() {
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-3 p-4">
      <EngineTrouble />
      <InvalidNote />
      <JobCard />
      <AssignedCard />
      <VerdictCard />
      <SpecialPointsCard />
      <CyclesCard />
      <ExponentsCard />
      <DensityCard />
      <EquilibriaSection />
      <PictureCard />
      <BranchesCard />
      <SecondOpinionCard />
      <NotesCard />
      <CommentsCard />
    </div>
  );
}
