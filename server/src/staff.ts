import 'reflect-metadata';
import { randomBytes } from 'node:crypto';
import { parseArgs } from 'node:util';
import { Sequelize } from 'sequelize-typescript';
import { z } from 'zod';
import { textSchema } from '@kerfyard/common/api';
import { emailSchema, passwordSchema } from '@kerfyard/common/people';
import { Accounts } from './people/accounts.ts';
import { Company } from './people/company.model.ts';
import { Membership } from './people/membership.model.ts';
import { Crew, Truck } from './people/unit.models.ts';
import { Audit } from './platform/audit/audit.ts';
import { Passwords } from './platform/auth/passwords.ts';
import { readConfig, type Config } from './platform/config/config.ts';
import { KeyVault } from './platform/crypto/key-vault.ts';
import { UnitOfWork } from './platform/database/unit-of-work.ts';

const USAGE = 'staff --email ada@kerfyard.example --name "Ada Quill" [--password "…"]';

const optionsSchema = z.object({
  email: emailSchema,
  name: textSchema(120),
  password: passwordSchema.optional(),
});
type StaffOptions = z.infer<typeof optionsSchema>;

/** @throws Error that lists every fault and the usage */
function readOptions(): StaffOptions {
  const { values } = parseArgs({
    options: { email: { type: 'string' }, name: { type: 'string' }, password: { type: 'string' } },
  });
  const parsed = optionsSchema.safeParse(values);
  if (parsed.success) return parsed.data;
  const faults = parsed.error.issues.map((issue) => `  --${issue.path.join('.')}: ${issue.message}`);
  throw new Error([`Usage: ${USAGE}`, ...faults].join('\n'));
}

/** Makes a staff person; nobody becomes staff by the app itself. Gives the password when it was made here. */
async function makeStaff(config: Config, options: StaffOptions): Promise<string | null> {
  const sequelize = new Sequelize(config.databaseUrl, {
    logging: false,
    pool: { max: 1 },
    models: [Company, Crew, Truck, Membership],
  });
  try {
    const uow = new UnitOfWork(sequelize);
    const accounts = new Accounts(Company, Membership, uow, new KeyVault(config));
    const audit = new Audit(uow);
    const password = options.password ?? randomBytes(15).toString('base64url');
    const passwordHash = await new Passwords().hash(password);
    await uow.run(async (tx) => {
      const userId = await accounts.createPerson(tx, { ...options, passwordHash }, true);
      if (userId === null) throw new Error(`${options.email} has an account already. Nothing was changed.`);
      await audit.write(tx, { actor: null, action: 'staff.made', subject: { type: 'user', id: userId } });
    });
    return options.password === undefined ? password : null;
  } finally {
    await sequelize.close();
  }
}

try {
  const options = readOptions();
  const password = await makeStaff(readConfig(), options);
  console.log(`${options.name} (${options.email}) is staff now.`);
  if (password !== null) console.log(`Password, shown this once: ${password}`);
} catch (error) {
  console.error(error instanceof Error ? error.message : 'No staff person was made');
  process.exitCode = 1;
}
