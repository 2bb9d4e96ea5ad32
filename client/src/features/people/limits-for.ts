import type { CompanyKind, Role } from '@kerfyard/common/people';

export type Limit = 'signCents' | 'setAsideCents' | 'changeCents';

const limits: Record<CompanyKind, Record<Role, readonly Limit[]>> = {
  general_contractor: {
    owner: [],
    accounts: ['setAsideCents'],
    manager: ['signCents', 'changeCents'],
    field: ['changeCents'],
  },
  cutting_contractor: { owner: [], accounts: [], manager: ['signCents', 'changeCents'], field: [] },
};

/** The limits that mean something for a role in a kind of company; an owner has none. */
export const limitsFor = (kind: CompanyKind, role: Role): readonly Limit[] => limits[kind][role];
