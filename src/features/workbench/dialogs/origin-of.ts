import type { PresetBody } from '@/contract/presets';

import type { Origin } from '../state/store';

export function originOf(body: PresetBody): Origin {
  return {
    kind: 'preset',
    id: body.preset.id,
    version: body.version.number,
    rights: body.rights,
    labName: body.preset.lab?.name ?? null,
    starter: body.preset.starter,
  };
}
