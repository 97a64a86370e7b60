import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A link that was e-mailed and works once. The token itself is nowhere; see auth/oneTimeToken. */
export class OneTimeLink extends Model<InferAttributes<OneTimeLink>, InferCreationAttributes<OneTimeLink>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare kind: 'reset' | 'invitation';
  declare userId: number;
  declare tokenHash: string;
  /** The e-mail that carries it. */
  declare outboxId: CreationOptional<number | null>;
  declare expiresAt: Date;
  declare usedAt: CreationOptional<Date | null>;
  /** Replaced by a later one, or by what made it pointless. */
  declare endedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineOneTimeLink(sequelize: Sequelize): void {
  OneTimeLink.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      kind: { type: DataTypes.ENUM('reset', 'invitation'), allowNull: false },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      tokenHash: { type: DataTypes.CHAR(64), field: 'token_hash', allowNull: false },
      outboxId: { type: DataTypes.BIGINT.UNSIGNED, field: 'outbox_id', allowNull: true },
      expiresAt: { type: DataTypes.DATE(3), field: 'expires_at', allowNull: false },
      usedAt: { type: DataTypes.DATE(3), field: 'used_at', allowNull: true },
      endedAt: { type: DataTypes.DATE(3), field: 'ended_at', allowNull: true },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'OneTimeLink', tableName: 'one_time_links', timestamps: true, updatedAt: false },
  );
}
