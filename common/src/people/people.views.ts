import type { Actor, CompanyKind, Role } from './roles.ts';
import type { Method } from './people.schema.ts';
import type { PermissionName } from './permissions.ts';

/** `GET /api/auth/me`: who is signed in, and what they may do. */
export interface MeView {
  user: { id: string; name: string; email: string; isStaff: boolean };
  company: { id: string; kind: CompanyKind; name: string } | null;
  role: Role | null;
  permissions: PermissionName[];
  limits: Actor['limits'];
  unread: { messages: number };
}

/** A step of the ladder: what must be there before a company may do it. */
export type LadderStep = 'look' | 'bid' | 'be_paid';

export interface OwnCompanyView {
  id: string;
  kind: CompanyKind;
  name: string;
  phone: string;
  yard: { zip: string; city: string; state: string; lat: number; lon: number } | null;
  serviceRadiusMi: number | null;
  methods: Method[];
  crews: { id: string; name: string }[];
  trucks: { id: string; name: string }[];
  payouts: { state: 'not_started' | 'under_way' | 'ready'; missing: string[] };
  /** For each step of the ladder, what is missing (empty when it is open). */
  ladder: Record<LadderStep, string[]>;
}

/** `GET /api/demo/people`, demo and development only: one press signs in as one of these. */
export interface DemoPersonView {
  key: string;
  name: string;
  company: string | null;
  kind: CompanyKind | 'staff';
  role: Role | 'staff';
}
