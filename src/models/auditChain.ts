import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from 'sequelize';

export class AuditChain extends Model<InferAttributes<AuditChain>, InferCreationAttributes<AuditChain>> {
  declare scope: string;
  declare length: number;
  declare head: string;
}

export function defineAuditChain(sequelize: Sequelize): void {
  AuditChain.init(
    {
      scope: { type: DataTypes.STRING(40), primaryKey: true, allowNull: false },
      length: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      head: { type: DataTypes.CHAR(64), allowNull: false },
    },
    { sequelize, modelName: 'AuditChain', tableName: 'audit_chains', timestamps: false },
  );
}
