import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** One of the imports a person may have under way at once. Free when `heldUntil` has passed. */
export class ImportTurn extends Model<InferAttributes<ImportTurn>, InferCreationAttributes<ImportTurn>> {
  declare userId: number;
  declare turn: number;
  declare holder: CreationOptional<string | null>;
  declare heldUntil: Date;
}

export function defineImportTurn(sequelize: Sequelize): void {
  ImportTurn.init(
    {
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', primaryKey: true, allowNull: false },
      turn: { type: DataTypes.TINYINT.UNSIGNED, primaryKey: true, allowNull: false },
      holder: { type: DataTypes.CHAR(16), allowNull: true },
      heldUntil: { type: DataTypes.DATE(3), field: 'held_until', allowNull: false },
    },
    { sequelize, modelName: 'ImportTurn', tableName: 'import_turns', timestamps: false },
  );
}
