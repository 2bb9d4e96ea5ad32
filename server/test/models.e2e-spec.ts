import { randomUUID } from 'node:crypto';
import { Sequelize } from 'sequelize-typescript';
import { Company } from '../src/people/company.model.ts';
import { Membership } from '../src/people/membership.model.ts';
import { Crew, Truck } from '../src/people/unit.models.ts';
import { refuseWritesOutsideTransactions } from '../src/platform/database/write-guard.ts';
import { makeCuttingContractor } from './builders/people.ts';
import { closeDatabase, sql } from './database.ts';

const models = [Company, Crew, Truck, Membership];
let sequelize: Sequelize;

beforeAll(() => {
  sequelize = new Sequelize(process.env.TEST_PG_URL ?? '', {
    logging: false,
    models,
    hooks: refuseWritesOutsideTransactions,
  });
});
afterAll(async () => {
  await sequelize.close();
  await closeDatabase();
});

interface Column {
  name: string;
  is_nullable: boolean;
  has_default: boolean;
}

describe('models', () => {
  it.each(models.map((model) => [model.name, model] as const))(
    '%s says what the schema says',
    async (_, model) => {
      const columns = await sql<Column>(
        `SELECT column_name AS name, is_nullable = 'YES' AS is_nullable, column_default IS NOT NULL AS has_default
       FROM information_schema.columns WHERE table_schema = 'public' AND table_name = $1`,
        [model.getTableName()],
      );
      const fields = Object.values((model as typeof Company).getAttributes()).map(({ field }) => field);
      const known = new Map(columns.map((column) => [column.name, column]));
      expect(fields.filter((field) => field === undefined || !known.has(field))).toEqual([]);
      // What a model leaves out must be able to stay out.
      const leftOut = columns.filter(({ name }) => !fields.includes(name));
      expect(leftOut.filter((column) => !column.is_nullable && !column.has_default)).toEqual([]);
    },
  );

  it('are not written outside a transaction in development and test', async () => {
    const company = await makeCuttingContractor();
    const { id } = company;
    const crew = { id: randomUUID(), companyId: id, name: 'Nobody' };
    const found = await Company.findByPk(id, { rejectOnEmpty: true });
    const attempts: (() => Promise<unknown>)[] = [
      () => Crew.create(crew),
      () => Crew.bulkCreate([crew]),
      () => Crew.upsert(crew),
      () => found.update({ name: 'Other' }),
      () => Company.update({ name: 'Other' }, { where: { id } }),
      () => Crew.destroy({ where: { companyId: id } }),
      () => found.destroy(),
    ];
    for (const attempt of attempts) await expect(attempt()).rejects.toThrow('without { transaction }');
    const [row] = await sql(
      'SELECT name, (SELECT count(*)::int FROM crew WHERE company_id = $1) AS crews FROM company WHERE id = $1',
      [id],
    );
    expect(row).toEqual({ name: company.name, crews: 1 });
    await sequelize.transaction((transaction) => Crew.create(crew, { transaction }));
    expect(await Crew.count({ where: { companyId: id } })).toBe(2);
  });
});
