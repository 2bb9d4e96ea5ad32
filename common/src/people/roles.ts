export const companyKinds = ['general_contractor', 'cutting_contractor'] as const;
export type CompanyKind = (typeof companyKinds)[number];

/** `owner` sets who may do what; `accounts` sees and moves money; `manager` posts, bids, awards, schedules; `field` sees its visits and logs work. */
export const roles = ['owner', 'accounts', 'manager', 'field'] as const;
export type Role = (typeof roles)[number];

/** Who is asking. Staff stand outside companies: `company` is null and `isStaff` true. */
export interface Actor {
  userId: string;
  sessionId: string;
  name: string;
  isStaff: boolean;
  company: { id: string; kind: CompanyKind; name: string } | null;
  role: Role | null;
  /** Limits in cents; null is unlimited (owners always are). */
  limits: { signCents: number | null; setAsideCents: number | null; changeCents: number | null };
}
