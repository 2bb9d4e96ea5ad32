import { setTimeout as sleep } from 'node:timers/promises';
import { Client } from 'pg';
import type { OwnCompanyView } from '@kerfyard/common/people';
import { verifyToken } from '../../people/verify-token.ts';
import type { Config } from '../../platform/config/config.ts';
import { newId } from '../../platform/ids/ids.ts';
import { DEMO_PASSWORD, demoCompanies, demoStaff, emailOf, type DemoCompany } from './cast.ts';
import { demoRateCard } from './demo-rate-card.ts';
import { DemoBrowser } from './demo-browser.ts';
import {
  ADD_MEMBER,
  COPY_PERSON,
  INSERT_DEMO_PERSON,
  MOVE_CLOCK,
  NEWEST_SIGN_UP,
  NOW,
  PAYOUT_ACCOUNT,
} from './demo-world.queries.ts';

/**
 * The demo's people at their browsers, the clock, and the pages of the payment stand-in. People sign up, confirm and
 * sign in as anyone does; only further members are written as rows, since there is no invitation yet.
 */
export class DemoWorld {
  private readonly browsers = new Map<string, DemoBrowser>();
  private position = 0;

  private constructor(
    private readonly config: Config,
    private readonly owner: Client,
  ) {}

  static async open(config: Config, ownerUrl: string): Promise<DemoWorld> {
    const owner = new Client({ connectionString: ownerUrl });
    await owner.connect();
    return new DemoWorld(config, owner);
  }

  close(): Promise<void> {
    return this.owner.end();
  }

  /** The browser of a person by key, signed in. */
  as(key: string): DemoBrowser {
    const browser = this.browsers.get(key);
    if (browser === undefined) throw new Error(`${key} is not signed in`);
    return browser;
  }

  /** The app's time. */
  async now(): Promise<Date> {
    const { rows } = await this.owner.query<{ now: Date }>(NOW);
    const [row] = rows;
    if (row === undefined) throw new Error('app_now() gave no row');
    return row.now;
  }

  async inDays(days: number): Promise<Date> {
    return new Date((await this.now()).getTime() + days * 86_400_000);
  }

  /** Put the app's clock this many days before the real one. Sessions go by real time, so everybody stays signed in. */
  async setDaysAgo(days: number): Promise<void> {
    await this.owner.query(MOVE_CLOCK, [Math.round(-days * 86_400_000)]);
  }

  /** Everyone signs up, completes the company and, where the cast says so, the payout set-up. */
  async castAll(): Promise<void> {
    for (const company of demoCompanies) await this.castCompany(company);
    await this.copyPerson(demoStaff.key, demoStaff.name, true);
    await this.signIn(demoStaff.key);
  }

  private async castCompany(company: DemoCompany): Promise<void> {
    const [ownerPerson, ...others] = company.people;
    if (ownerPerson === undefined) throw new Error(`${company.key} has no owner`);
    await this.signUp(company, ownerPerson);
    const { id } = await this.as(ownerPerson.key).get<OwnCompanyView>('/api/company');
    for (const person of others) {
      await this.copyPerson(person.key, person.name, false);
      await this.owner.query(ADD_MEMBER, [
        emailOf(person.key),
        id,
        person.role,
        person.setAsideLimitCents ?? null,
      ]);
      await this.signIn(person.key);
    }
    if (company.kind === 'cutting_contractor') await this.equip(company, ownerPerson.key, id);
  }

  private async signUp(company: DemoCompany, person: { key: string; name: string }): Promise<void> {
    const browser = new DemoBrowser(this.config.appUrl);
    const { kind, name, phone } = company;
    const email = emailOf(person.key);
    await browser.post('/api/auth/sign-up', {
      name: person.name,
      email,
      password: DEMO_PASSWORD,
      company: { kind, name, phone },
    });
    const { rows } = await this.owner.query<{ id: string }>(NEWEST_SIGN_UP, [email]);
    await browser.post('/api/auth/verify', {
      token: verifyToken(this.config.signingSecret, rows[0]?.id ?? ''),
    });
    await this.remember(person.key);
    await this.signIn(person.key);
  }

  private async equip(company: DemoCompany, key: string, companyId: string): Promise<void> {
    const browser = this.as(key);
    await browser.put('/api/company', {
      name: company.name,
      phone: company.phone,
      yard: company.yard ?? null,
      serviceRadiusMi: company.serviceRadiusMi ?? null,
      methods: company.methods ?? [],
    });
    for (const name of company.crews ?? []) await browser.post('/api/company/crews', { id: newId(), name });
    for (const name of company.trucks ?? []) await browser.post('/api/company/trucks', { id: newId(), name });
    if (company.hasRateCard === true) {
      await browser.put('/api/company/rate-card', { version: 0, card: demoRateCard });
    }
    if (company.isPaidOut !== true) return;
    await browser.post('/api/company/payouts');
    const { rows } = await this.owner.query<{ payout_account_id: string }>(PAYOUT_ACCOUNT, [companyId]);
    await this.atProvider('onboard', { account: rows[0]?.payout_account_id, businessName: company.name });
    await this.until('the payout set-up', async () => {
      const { payouts } = await browser.get<OwnCompanyView>('/api/company');
      return payouts.state === 'ready';
    });
  }

  private async copyPerson(key: string, name: string, isStaff: boolean): Promise<void> {
    await this.owner.query(COPY_PERSON, [newId(), emailOf(key), name, isStaff]);
    await this.remember(key);
  }

  private async remember(key: string): Promise<void> {
    this.position += 1;
    await this.owner.query(INSERT_DEMO_PERSON, [key, emailOf(key), this.position]);
  }

  private async signIn(key: string): Promise<void> {
    const browser = new DemoBrowser(this.config.appUrl);
    await browser.post('/api/auth/sign-in', { email: emailOf(key), password: DEMO_PASSWORD });
    this.browsers.set(key, browser);
  }

  /** Press a button on the payment stand-in's pages. */
  async atProvider(what: 'pay' | 'onboard', body: object): Promise<void> {
    const address = this.config.stripe.apiUrl;
    if (address === null) throw new Error('the demo needs the payment stand-in');
    const response = await fetch(new URL(`/_fake/${what}`, address), {
      method: 'POST',
      body: JSON.stringify(body),
    });
    if (!response.ok) throw new Error(`${what} gave ${response.status}: ${await response.text()}`);
  }

  async until(what: string, isSo: () => Promise<boolean>): Promise<void> {
    const end = performance.now() + 20_000;
    while (!(await isSo())) {
      if (performance.now() > end) throw new Error(`waited for ${what}`);
      await sleep(50);
    }
  }
}
