import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** What somebody wrote beside a job, a sample or a run; exactly one of the three. Written once. */
export class Note extends Model<InferAttributes<Note>, InferCreationAttributes<Note>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare jobId: CreationOptional<number | null>;
  declare sampleId: CreationOptional<number | null>;
  declare sweepId: CreationOptional<number | null>;
  /** The client the record belonged to when it was written: a note does not follow a run to another client. */
  declare organisationId: number;
  declare audience: 'lab' | 'client';
  declare text: string;
  declare userId: number;
  declare createdAt: CreationOptional<Date>;
}

export function defineNote(sequelize: Sequelize): void {
  Note.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      jobId: { type: DataTypes.BIGINT.UNSIGNED, field: 'job_id', allowNull: true },
      sampleId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sample_id', allowNull: true },
      sweepId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sweep_id', allowNull: true },
      organisationId: { type: DataTypes.BIGINT.UNSIGNED, field: 'organisation_id', allowNull: false },
      audience: { type: DataTypes.ENUM('lab', 'client'), allowNull: false },
      text: { type: DataTypes.STRING(2000), allowNull: false },
      userId: { type: DataTypes.BIGINT.UNSIGNED, field: 'user_id', allowNull: false },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
    },
    { sequelize, modelName: 'Note', tableName: 'notes', timestamps: true, updatedAt: false },
  );
}
