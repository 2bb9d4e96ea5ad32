import type { Actor, CompanyKind, Role } from './roles.ts';

/** `GET /api/account`: one's own account, beyond what `GET /api/auth/me` says. */
export interface AccountView {
  email: string;
  /** An address that waits for its link to be pressed, or null. */
  pendingEmail: string | null;
  secondFactor: {
    isSet: boolean;
    /** Recovery codes not used yet. */
    recoveryCodesLeft: number;
    /** Whether this person must have one before money moves. */
    isRequired: boolean;
  };
}

/** One of one's own sessions: a browser that is signed in. */
export interface SessionView {
  id: string;
  isCurrent: boolean;
  startedAt: string;
  lastUsedAt: string;
  ip: string;
  userAgent: string;
}

/** `GET /api/account/session`: until when this session lasts. */
export interface SessionEndView {
  endsAt: string;
  /** The last possible moment is reached: only signing in again goes beyond it. */
  isFinal: boolean;
}

/** `POST /api/account/second-factor`: what an authenticator app needs (RFC 6238; the address as such apps read it). */
export interface NewSecondFactorView {
  /** Base32, for typing in by hand. */
  secret: string;
  /** `otpauth://totp/…`, shown as a QR code. */
  address: string;
}

/** Shown once; only their hashes are kept. */
export interface RecoveryCodesView {
  codes: string[];
}

export interface MemberView {
  id: string;
  name: string;
  role: Role;
  isActive: boolean;
  isSelf: boolean;
  /** For those who manage people; null for the rest. */
  details: { email: string; limits: Actor['limits']; hasSecondFactor: boolean } | null;
}

export interface InvitationView {
  id: string;
  email: string;
  role: Role;
  limits: Actor['limits'];
  invitedBy: string;
  expiresAt: string;
  isExpired: boolean;
}

/** `GET /api/company/people`. Invitations are listed for those who manage people. */
export interface PeopleView {
  members: MemberView[];
  invitations: InvitationView[];
}

/** `POST /api/auth/invitation`: what an invitation's link says to whoever holds it. */
export interface InvitationOfferView {
  email: string;
  company: { name: string; kind: CompanyKind };
  invitedBy: string;
  role: Role;
  expiresAt: string;
  /** The address has an account already, and an account belongs to one company. */
  hasAccount: boolean;
}
