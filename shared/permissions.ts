/** The one table of who may do what. The API enforces it; the interface mirrors it. */

export const ROLES = ["owner", "designer", "reviewer", "librarian", "buyer", "viewer"] as const;
export type Role = (typeof ROLES)[number];

export const PERMISSIONS = {
  "design:read": ["owner", "designer", "reviewer", "librarian", "buyer", "viewer"],
  "design:write": ["owner", "designer"],
  "comment:write": ["owner", "designer", "reviewer", "librarian", "buyer"],
  "review:decide": ["owner", "reviewer"],
  "library:write": ["owner", "librarian"],
  "price:write": ["owner", "librarian", "buyer"],
  "team:manage": ["owner"],
} as const satisfies Record<string, readonly Role[]>;

export type Action = keyof typeof PERMISSIONS;

/** Whether any of a member's roles allows the action. */
export function may(roles: readonly Role[], action: Action): boolean {
  const allowed: readonly Role[] = PERMISSIONS[action];
  return roles.some((role) => allowed.includes(role));
}
