import type { CreationOptional, InferAttributes, InferCreationAttributes } from 'sequelize';
import { Column, DataType, ForeignKey, Model, PrimaryKey, Table } from 'sequelize-typescript';
import type { Role } from '@kerfyard/common/people';
import { Company } from './company.model.ts';

/** A person's place in the one company it belongs to. Limits in cents; null is unlimited. */
@Table({ tableName: 'membership', timestamps: false, underscored: true })
export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  @PrimaryKey
  @Column(DataType.UUID)
  declare userId: string;

  @ForeignKey(() => Company)
  @Column(DataType.UUID)
  declare companyId: string;

  @Column(DataType.TEXT)
  declare role: Role;

  @Column(DataType.BIGINT)
  declare signLimitCents: CreationOptional<number | null>;

  @Column(DataType.BIGINT)
  declare setAsideLimitCents: CreationOptional<number | null>;

  @Column(DataType.BIGINT)
  declare changeLimitCents: CreationOptional<number | null>;
}
