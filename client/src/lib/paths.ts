import type { CompanyKind } from '@kerfyard/common/people';

/** Every address of the app in one place; a feature adds its own here and nowhere writes one by hand. */
export const paths = {
  home: '/',
  signUp: (kind?: CompanyKind) => (kind === undefined ? '/sign-up' : `/sign-up?as=${asParameter[kind]}`),
  signIn: (next?: string) => (next === undefined ? '/sign-in' : `/sign-in?next=${encodeURIComponent(next)}`),
  reset: '/reset',
  account: '/account',
  company: '/company',
  people: '/company/people',
  rateCard: '/company/rate-card',
  calculators: '/calculators',
  calculator: (name: string) => `/calculators/${name}`,
  scopes: '/scopes',
  newScope: '/scopes/new',
  scope: (id: string) => `/scopes/${id}`,
  scopeBids: (id: string) => `/scopes/${id}/bids`,
  openScopes: '/open-scopes',
  openScope: (id: string) => `/open-scopes/${id}`,
  bids: '/bids',
  work: '/work',
  workItem: (id: string) => `/work/${id}`,
  workMoney: (id: string) => `/work/${id}/money`,
  jobSheet: (id: string, visitId: string) => `/work/${id}/job-sheet?visit=${visitId}`,
  money: '/money',
  talk: '/talk',
  thread: (id: string) => `/talk/${id}`,
  books: '/books',
} as const;

const asParameter: Record<CompanyKind, string> = { general_contractor: 'gc', cutting_contractor: 'crew' };

/** The company kind that `?as=` names, or undefined. */
export function kindFromParameter(value: string | null): CompanyKind | undefined {
  if (value === 'gc') return 'general_contractor';
  if (value === 'crew') return 'cutting_contractor';
  return undefined;
}

/** Where a person lands after signing in. */
export function homeOf(who: { isStaff: boolean; kind: CompanyKind | null }): string {
  if (who.isStaff) return paths.books;
  return who.kind === 'cutting_contractor' ? paths.openScopes : paths.scopes;
}

/** A path to return to after signing in: inside this app only, never another site's address. */
export function safeNext(value: string | null): string | undefined {
  if (value === null || !/^\/(?![/\\])/.test(value)) return undefined;
  return value;
}
