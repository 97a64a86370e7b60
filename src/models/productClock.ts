import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A clock or a switching converter that a product is declared to run at. */
export class ProductClock extends Model<InferAttributes<ProductClock>, InferCreationAttributes<ProductClock>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare productId: number;
  declare name: string;
  declare kind: 'clock' | 'converter';
  declare frequencyHz: number;
  declare tolerancePpm: number;
  /** null with `spreadPct`: not spread. */
  declare spreadKind: CreationOptional<'down' | 'centre' | null>;
  /** The whole width of the sweep as a part of the frequency, in percent. */
  declare spreadPct: CreationOptional<number | null>;
  declare note: string;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawReason: CreationOptional<string | null>;
  declare withdrawnBy: CreationOptional<number | null>;
  declare version: CreationOptional<number>;
  declare userId: number;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineProductClock(sequelize: Sequelize): void {
  ProductClock.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      productId: { type: DataTypes.BIGINT.UNSIGNED, field: 'product_id', allowNull: false },
      name: { type: DataTypes.STRING(80), allowNull: false },
      kind: { type: DataTypes.ENUM('clock', 'converter'), allowNull: false },
      frequencyHz: { type: DataTypes.DOUBLE, field: 'frequency_hz', allowNull: false },
      tolerancePpm: { type: DataTypes.DOUBLE, field: 'tolerance_ppm', allowNull: false },
      spreadKind: { type: DataTypes.ENUM('down', 'centre'), field: 'spread_kind', allowNull: true },
      spreadPct: { type: DataTypes.DOUBLE, field: 'spread_pct', allowNull: true },
      note: { type: DataTypes.STRING(300), allowNull: false },
      withdrawnAt: { type: DataTypes.DATE(3), field: 'withdrawn_at', allowNull: true },
      withdrawReason: { type: DataTypes.STRING(300), field: 'withdraw_reason', allowNull: true },
      withdrawnBy: { type: DataTypes.BIGINT.UNSIGNED, field: 'withdrawn_by', allowNull: true },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'ProductClock', tableName: 'product_clocks', timestamps: true },
  );
}
