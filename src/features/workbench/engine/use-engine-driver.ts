import { useEffect } from 'react';

import { createEngineClient } from '@/workers/client';
import type { EngineClient } from '@/workers/protocol';

import { useWorkbenchStore } from '../state/store';
import { EngineDriver } from './engine-driver';

/** Runs the engine for the workbench on the page, from its opening to its leaving. */
export function useEngineDriver(createClient: () => EngineClient = createEngineClient): void {
  const store = useWorkbenchStore();
  useEffect(() => {
    const client = createClient();
    const driver = new EngineDriver(store, client);
    driver.start();
    return () => {
      driver.stop();
      client.dispose();
    };
  }, [store, createClient]);
}
