import type { Actor, CompanyKind, Role } from './roles.ts';

interface Permission {
  kind: CompanyKind | 'either' | 'staff';
  roles: readonly Role[];
}

const everyone: readonly Role[] = ['owner', 'accounts', 'manager', 'field'];
const deciders: readonly Role[] = ['owner', 'manager'];
const payers: readonly Role[] = ['owner', 'accounts'];
const office: readonly Role[] = ['owner', 'accounts', 'manager'];

/**
 * What each role may do. A permission says nothing about *whose* thing it is: each service checks that first.
 * Every route and socket handler names one of these, or is public, or is open to any signed-in person.
 */
export const permissions = {
  'company.read': { kind: 'either', roles: everyone },
  'company.edit': { kind: 'either', roles: ['owner', 'manager'] },
  'people.manage': { kind: 'either', roles: ['owner'] },
  'scope.read': { kind: 'either', roles: everyone },
  'scope.write': { kind: 'general_contractor', roles: deciders },
  'scope.award': { kind: 'general_contractor', roles: deciders },
  'bid.read': { kind: 'cutting_contractor', roles: office },
  'bid.write': { kind: 'cutting_contractor', roles: deciders },
  'bid.tabulate': { kind: 'general_contractor', roles: office },
  'subcontract.read': { kind: 'either', roles: everyone },
  'subcontract.sign': { kind: 'either', roles: deciders },
  'money.read': { kind: 'either', roles: payers },
  'money.set_aside': { kind: 'general_contractor', roles: payers },
  'money.release': { kind: 'general_contractor', roles: payers },
  'money.payout': { kind: 'cutting_contractor', roles: payers },
  'visit.read': { kind: 'either', roles: everyone },
  'visit.propose': { kind: 'cutting_contractor', roles: deciders },
  'visit.confirm': { kind: 'general_contractor', roles: deciders },
  'visit.work': { kind: 'cutting_contractor', roles: ['owner', 'manager', 'field'] },
  'completion.submit': { kind: 'cutting_contractor', roles: ['owner', 'manager', 'field'] },
  'completion.accept': { kind: 'general_contractor', roles: deciders },
  talk: { kind: 'either', roles: everyone },
  'file.upload': { kind: 'either', roles: everyone },
  'staff.read': { kind: 'staff', roles: [] },
} as const satisfies Record<string, Permission>;

export type PermissionName = keyof typeof permissions;

/** Whether this person's company kind and role carry a permission. */
export function may(actor: Pick<Actor, 'isStaff' | 'company' | 'role'>, name: PermissionName): boolean {
  const permission: Permission = permissions[name];
  if (permission.kind === 'staff') return actor.isStaff;
  if (actor.company === null || actor.role === null) return false;
  if (permission.kind !== 'either' && permission.kind !== actor.company.kind) return false;
  return permission.roles.includes(actor.role);
}
