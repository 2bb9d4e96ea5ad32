import { Sequelize } from 'sequelize';
import { UnitOfWork } from '../src/platform/database/unit-of-work.ts';

export interface CountedQueries {
  uow: UnitOfWork;
  /** How many statements this work sends to the database. */
  during: (work: () => Promise<unknown>) => Promise<number>;
  close: () => Promise<void>;
}

/** A reader's own connection that counts its statements: what a list costs must not grow with its rows. */
export function countQueries(): CountedQueries {
  let count = 0;
  const sequelize = new Sequelize(process.env.TEST_PG_URL ?? '', {
    logging: () => (count += 1),
    pool: { max: 2 },
  });
  return {
    uow: new UnitOfWork(sequelize),
    during: async (work) => {
      count = 0;
      await work();
      return count;
    },
    close: () => sequelize.close(),
  };
}
