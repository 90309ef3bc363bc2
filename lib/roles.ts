/** What a member of a workspace may do. Each role may do all that the ones before it may. */
export const roles = ['viewer', 'reviewer', 'editor', 'owner'] as const;
export type Role = (typeof roles)[number];

/** True when `role` reaches `needed`. */
export const roleReaches = (role: Role, needed: Role): boolean =>
  roles.indexOf(role) >= roles.indexOf(needed);

export const roleSummaries: Record<Role, string> = {
  viewer: 'reads everything',
  reviewer: 'reads, comments and decides reviews',
  editor: 'draws kernels and fabrics, places and solves',
  owner: 'manages members and the workspace',
};
