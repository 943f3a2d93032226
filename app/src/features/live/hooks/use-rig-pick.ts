import { useState } from 'react';
import { NO_FAULTS, type PracticeFaults } from '../model/practice-faults';
import { keepPick, readPick, type RigPick } from '../model/rig-pick';

export interface RigSetupState {
  readonly pick: RigPick;
  readonly faults: PracticeFaults;
}

/** What is chosen to work on, remembered for each rig. */
export function useRigPick(rigId: string | null): [RigSetupState, (next: RigSetupState) => void] {
  const [held, setHeld] = useState(() => ({ rigId, pick: readPick(rigId), faults: NO_FAULTS }));
  const state = held.rigId === rigId ? held : { ...held, pick: readPick(rigId) };
  return [
    state,
    (next) => {
      keepPick(rigId, next.pick);
      setHeld({ rigId, ...next });
    },
  ];
}
