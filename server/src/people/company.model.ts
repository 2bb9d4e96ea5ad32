import type { InferAttributes, InferCreationAttributes, NonAttribute, CreationOptional } from 'sequelize';
import { Column, DataType, Default, HasMany, Model, PrimaryKey, Table } from 'sequelize-typescript';
import type { CompanyKind, Method } from '@kerfyard/common/people';
import { Crew, Truck } from './unit.models.ts';

/** A general contractor or a cutting contractor. The yard and what follows are a cutting contractor's alone. */
@Table({ tableName: 'company', timestamps: false, underscored: true })
export class Company extends Model<InferAttributes<Company>, InferCreationAttributes<Company>> {
  @PrimaryKey
  @Column(DataType.UUID)
  declare id: string;

  @Column(DataType.TEXT)
  declare kind: CompanyKind;

  @Column(DataType.TEXT)
  declare name: string;

  @Column(DataType.TEXT)
  declare phone: string;

  @Column(DataType.TEXT)
  declare yardZip: CreationOptional<string | null>;

  @Column(DataType.TEXT)
  declare yardCity: CreationOptional<string | null>;

  @Column(DataType.TEXT)
  declare yardState: CreationOptional<string | null>;

  @Column(DataType.DOUBLE)
  declare yardLat: CreationOptional<number | null>;

  @Column(DataType.DOUBLE)
  declare yardLon: CreationOptional<number | null>;

  @Column(DataType.INTEGER)
  declare serviceRadiusMi: CreationOptional<number | null>;

  @Default([])
  @Column(DataType.ARRAY(DataType.TEXT))
  declare methods: CreationOptional<Method[]>;

  /** The provider's name for the account that released money goes to. */
  @Column(DataType.TEXT)
  declare payoutAccountId: CreationOptional<string | null>;

  @Default(false)
  @Column(DataType.BOOLEAN)
  declare payoutsReady: CreationOptional<boolean>;

  @Default([])
  @Column(DataType.ARRAY(DataType.TEXT))
  declare payoutRequirements: CreationOptional<string[]>;

  /** The company's own key under the master key; see KeyVault. */
  @Column(DataType.BLOB)
  declare wrappedKey: Buffer;

  @Default(1)
  @Column(DataType.INTEGER)
  declare version: CreationOptional<number>;

  @Column(DataType.DATE)
  declare updatedAt: CreationOptional<Date>;

  @HasMany(() => Crew, 'companyId')
  declare crews?: NonAttribute<Crew[]>;

  @HasMany(() => Truck, 'companyId')
  declare trucks?: NonAttribute<Truck[]>;
}
