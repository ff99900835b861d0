/** Roles are lists of capabilities; routes and sockets name the capability they need, never a role. */
export const roles = ['technician', 'foreman', 'manager'] as const;
export type Role = (typeof roles)[number];

export const capabilities = [
  'board:read',
  'stock:read',
  'stock:write',
  'spare:quarantine',
  'spare:release',
  'equipment:read',
  'equipment:write',
  'charge:plan',
  'charge:run',
  'charge:correct-any',
  'charge:assign',
  'repair:read',
  'repair:write',
  'repair:decide',
  'repair:export',
  'repair:delete',
  'customer:data',
  'alert:take',
  'work:read',
  'work:write',
  'bench:plan',
  'wall:approve',
  'wall:revoke',
  'waits:read',
  'people:read',
  'people:write',
  'workshop:write',
] as const;
export type Capability = (typeof capabilities)[number];

const technician: Capability[] = [
  'board:read',
  'stock:read',
  'stock:write',
  'spare:quarantine',
  'equipment:read',
  'charge:plan',
  'charge:run',
  'repair:read',
  'repair:write',
  'alert:take',
  'work:read',
  'work:write',
  'people:read',
];
const foreman: Capability[] = [
  ...technician,
  'spare:release',
  'charge:correct-any',
  'charge:assign',
  'bench:plan',
  'repair:decide',
  'repair:export',
  'wall:approve',
  'wall:revoke',
  'waits:read',
];
const manager: Capability[] = [
  ...foreman,
  'repair:delete',
  'customer:data',
  'equipment:write',
  'people:write',
  'workshop:write',
];

export const roleCapabilities: Record<Role, readonly Capability[]> = { technician, foreman, manager };

/** True where the role holds the capability. */
export const can = (role: Role, capability: Capability): boolean => roleCapabilities[role].includes(capability);

/** Settings of a workshop that give a role more. */
export interface RoleSettings {
  technicianDecides?: boolean | null;
}

/** The capabilities of a role in a workshop: those of the role, and what the workshop's settings add. */
export const capabilitiesIn = (role: Role, settings: RoleSettings): readonly Capability[] =>
  settings.technicianDecides === true && !can(role, 'repair:decide')
    ? [...roleCapabilities[role], 'repair:decide']
    : roleCapabilities[role];

/** The least role that holds a capability, for the sentence on a forbidden screen. */
export const leastRoleWith = (capability: Capability): Role => roles.find((role) => can(role, capability)) ?? 'manager';
