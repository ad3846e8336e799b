/** Roles belong to membership of a lab. Rights are verbs; this table is the only place that joins them. */
export const ROLES = ['supervisor', 'researcher', 'student', 'collaborator'] as const;
export type Role = (typeof ROLES)[number];

/** What one may do inside a lab, by role. The owner of a preset holds every preset verb on it. */
export const LAB_RIGHTS = {
  'view lab': ['supervisor', 'researcher', 'student', 'collaborator'],
  'view members': ['supervisor', 'researcher', 'student', 'collaborator'],
  'view lab history': ['supervisor'],
  'export the lab': ['supervisor'],
  'invite members': ['supervisor'],
  'change roles': ['supervisor'],
  'remove members': ['supervisor'],
  'rename the lab': ['supervisor'],
  'leave the lab': ['supervisor', 'researcher', 'student', 'collaborator'],
  'view lab presets': ['supervisor', 'researcher', 'student', 'collaborator'],
  'create lab presets': ['supervisor', 'researcher', 'student'],
  'save lab presets': ['supervisor', 'researcher'],
  'delete lab presets': ['supervisor'],
  'share lab presets by link': ['supervisor', 'researcher'],
  'set sweeps': ['supervisor'],
  'review hand-ins': ['supervisor'],
  'do assigned sweeps': ['researcher', 'student', 'collaborator'],
} as const satisfies Record<string, readonly Role[]>;
export type LabRight = keyof typeof LAB_RIGHTS;

export const PRESET_RIGHTS = [
  'view',
  'save',
  'restore',
  'duplicate',
  'comment',
  'change visibility',
  'share by link',
  'delete',
] as const;
export type PresetRight = (typeof PRESET_RIGHTS)[number];

/** Roles that hold a right. */
export function rolesThatMay(right: LabRight): readonly Role[] {
  return LAB_RIGHTS[right];
}

export function roleMay(role: Role, right: LabRight): boolean {
  return rolesThatMay(right).includes(role);
}
