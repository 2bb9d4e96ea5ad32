import { Module } from '@nestjs/common';
import { getConnectionToken, SequelizeModule, type SequelizeModuleOptions } from '@nestjs/sequelize';
import { Sequelize } from 'sequelize';
import { CONFIG, type Config } from '../config/config.ts';
import { refuseWritesOutsideTransactions } from './write-guard.ts';

/** One pool of connections as the app's role. Features add their models by `SequelizeModule.forFeature`. */
@Module({
  imports: [
    SequelizeModule.forRootAsync({
      inject: [CONFIG],
      useFactory: (config: Config): SequelizeModuleOptions => ({
        dialect: 'postgres',
        uri: config.databaseUrl,
        logging: false,
        timezone: '+00:00',
        pool: { max: 12, min: 1, idle: 30_000, acquire: 10_000 },
        dialectOptions: { application_name: 'kerfyard-app' },
        autoLoadModels: true,
        synchronize: false,
        retryAttempts: 3,
        retryDelay: 1_000,
        hooks: config.mode === 'production' || config.mode === 'demo' ? {} : refuseWritesOutsideTransactions,
      }),
    }),
  ],
  providers: [{ provide: Sequelize, useExisting: getConnectionToken() }],
  exports: [Sequelize, SequelizeModule],
})
export class DatabaseModule {}
