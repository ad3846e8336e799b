import { beginEarly } from '@/lib/early-requests';
import { beginEngineEarly } from '@/workers/create-engine-worker';

/**
 * First thing of the page. What it will need is asked for at once, side by side: who is signed in, and on the
 * workbench its preset, its code and the engine; the application follows.
 */
const preset = /^\/presets\/([^/]+)$/.exec(location.pathname)?.[1];
beginEarly('/session');
if (preset !== undefined && preset !== 'new') beginEarly(`/presets/${preset}`);
void import('./main');
if (preset !== undefined || location.pathname.startsWith('/s/')) {
  beginEngineEarly();
  void import('./workbench-route');
}
