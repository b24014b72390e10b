/** The roles of product.md. A person holds any number of them in a team; they add up. */
export const roles = ['viewer', 'designer', 'engineer', 'reviewer', 'admin'] as const;

export type Role = (typeof roles)[number];

/** What a member may do. The server checks a capability on every route; the client only hides what would be refused. */
export const capabilities = {
  read: ['viewer', 'designer', 'engineer', 'reviewer', 'admin'],
  editAssemblies: ['designer', 'engineer'],
  askForDecision: ['designer', 'engineer'],
  editValues: ['engineer'],
  decide: ['reviewer'],
  administer: ['admin'],
} as const satisfies Record<string, readonly Role[]>;

export type Capability = keyof typeof capabilities;

/** True when at least one of the held roles grants the capability. */
export function may(held: readonly Role[], capability: Capability): boolean {
  return capabilities[capability].some((role) => held.includes(role));
}
