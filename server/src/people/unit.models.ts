import type { InferAttributes, InferCreationAttributes } from 'sequelize';
import { Column, DataType, Model, PrimaryKey, Table } from 'sequelize-typescript';

/** People who go out together: what a visit books. */
@Table({ tableName: 'crew', timestamps: false, underscored: true })
export class Crew extends Model<InferAttributes<Crew>, InferCreationAttributes<Crew>> {
  @PrimaryKey
  @Column(DataType.UUID)
  declare id: string;

  @Column(DataType.UUID)
  declare companyId: string;

  @Column(DataType.TEXT)
  declare name: string;
}

/** A truck, which a visit books as well. */
@Table({ tableName: 'truck', timestamps: false, underscored: true })
export class Truck extends Model<InferAttributes<Truck>, InferCreationAttributes<Truck>> {
  @PrimaryKey
  @Column(DataType.UUID)
  declare id: string;

  @Column(DataType.UUID)
  declare companyId: string;

  @Column(DataType.TEXT)
  declare name: string;
}
