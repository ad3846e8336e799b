import { createContext, useContext } from 'react';

import type { HandIn } from '@/contract/assigned-sweeps';

import type { Sent } from './hand-in-sender';

/** What the page of an assigned sweep can do for the parts of the bench. */
export interface AssignedActions {
  keepMine(revision: number): void;
  takeTheirs(): void;
  send(body: HandIn): Promise<Sent>;
}

const NOTHING: AssignedActions = {
  keepMine: () => undefined,
  takeTheirs: () => undefined,
  send: () => Promise.resolve({ kind: 'refused', message: 'This is no assigned sweep.' }),
};

export const AssignedActionsContext = createContext<AssignedActions>(NOTHING);

export function useAssignedActions(): AssignedActions {
  return useContext(AssignedActionsContext);
}
