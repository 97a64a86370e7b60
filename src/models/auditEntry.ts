import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class AuditEntry extends Model<InferAttributes<AuditEntry>, InferCreationAttributes<AuditEntry>> {
  declare id: CreationOptional<number>;
  declare scope: string;
  declare seq: number;
  declare at: Date;
  declare actorId: CreationOptional<number | null>;
  declare action: string;
  declare subjectType: string;
  declare subjectId: string;
  declare canonical: string;
  declare previousHash: string;
  declare hash: string;
}

export function defineAuditEntry(sequelize: Sequelize): void {
  AuditEntry.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      scope: { type: DataTypes.STRING(40), allowNull: false },
      seq: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      at: { type: DataTypes.DATE(3), allowNull: false },
      actorId: { type: DataTypes.BIGINT.UNSIGNED, field: 'actor_id', allowNull: true },
      action: { type: DataTypes.STRING(240), allowNull: false },
      subjectType: { type: DataTypes.STRING(40), field: 'subject_type', allowNull: false },
      subjectId: { type: DataTypes.CHAR(16), field: 'subject_id', allowNull: false },
      canonical: { type: DataTypes.TEXT('long'), allowNull: false },
      previousHash: { type: DataTypes.CHAR(64), field: 'previous_hash', allowNull: false },
      hash: { type: DataTypes.CHAR(64), allowNull: false },
    },
    { sequelize, modelName: 'AuditEntry', tableName: 'audit_entries', timestamps: false },
  );
}
