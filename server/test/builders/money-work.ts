import { randomUUID } from 'node:crypto';
import type { Actor } from '@kerfyard/common/people';
import type { MoneyLab } from '../money-lab.ts';

/** A signed subcontract as far as money sees it, written as rows: nothing of how it came about is under test. */
export interface MoneyWork {
  subcontractId: string;
  gc: Actor;
  crew: Actor;
  lines: { id: string; cents: number }[];
}

const INSERT_COMPANY = `
  INSERT INTO company (id, kind, name, phone, wrapped_key) VALUES ($1, $2, $3, '+1 555 0100', '\\x00')`;
const INSERT_USER = `
  INSERT INTO app_user (id, email, name, password_hash) VALUES ($1, $2, 'Ada Quill', 'none')`;
const INSERT_SUBCONTRACT = `
  INSERT INTO subcontract (id, number, scope_id, revision, award_id, bid_id, gc_company_id, crew_company_id, status,
    total_cents, retainage_basis_points, fee_basis_points, answer_days, document_file_id, sign_by)
  SELECT $1, 1 + coalesce(max(number), 0), gen_random_uuid(), 1, gen_random_uuid(), gen_random_uuid(), $2, $3, 'active',
    $4, $5, $6, 7, gen_random_uuid(), app_now() FROM subcontract`;
const INSERT_LINE = `
  INSERT INTO sov_line (id, subcontract_id, position, description, amount_cents) VALUES ($1, $2, $3, 'Cut', $4)`;
const INSERT_COMPLETION = `
  INSERT INTO completion (id, subcontract_id, visit_id, status, as_cut, submitted_by, answer_by)
  VALUES ($1, $2, gen_random_uuid(), 'accepted', '[]', $3, app_now())`;
const INSERT_COMPLETION_LINE = `INSERT INTO completion_line (completion_id, sov_line_id) VALUES ($1, $2)`;

async function makeActor(lab: MoneyLab, kind: 'general_contractor' | 'cutting_contractor'): Promise<Actor> {
  const company = { id: randomUUID(), kind, name: 'North Pier' };
  const userId = randomUUID();
  await lab.unruled(INSERT_COMPANY, [company.id, company.kind, company.name]);
  await lab.unruled(INSERT_USER, [userId, `${userId}@northpier.example`]);
  return {
    userId,
    sessionId: randomUUID(),
    name: 'Ada Quill',
    isStaff: false,
    company,
    role: 'owner',
    limits: { signCents: null, setAsideCents: null, changeCents: null },
  };
}

export async function makeMoneyWork(
  lab: MoneyLab,
  terms: { lineCents: readonly number[]; retainageBasisPoints: number; feeBasisPoints: number },
): Promise<MoneyWork> {
  const gc = await makeActor(lab, 'general_contractor');
  const crew = await makeActor(lab, 'cutting_contractor');
  const subcontractId = randomUUID();
  const total = terms.lineCents.reduce((sum, cents) => sum + cents, 0);
  await lab.unruled(INSERT_SUBCONTRACT, [
    subcontractId,
    gc.company?.id,
    crew.company?.id,
    total,
    terms.retainageBasisPoints,
    terms.feeBasisPoints,
  ]);
  const lines = terms.lineCents.map((cents) => ({ id: randomUUID(), cents }));
  for (const [index, line] of lines.entries()) {
    await lab.unruled(INSERT_LINE, [line.id, subcontractId, index + 1, line.cents]);
  }
  return { subcontractId, gc, crew, lines };
}

/** A completion of these lines that the general contractor has accepted. Gives its id. */
export async function acceptLines(
  lab: MoneyLab,
  work: MoneyWork,
  lineIds: readonly string[],
): Promise<string> {
  const id = randomUUID();
  await lab.unruled(INSERT_COMPLETION, [id, work.subcontractId, work.crew.userId]);
  for (const lineId of lineIds) await lab.unruled(INSERT_COMPLETION_LINE, [id, lineId]);
  return id;
}
