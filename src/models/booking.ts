import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export class Booking extends Model<InferAttributes<Booking>, InferCreationAttributes<Booking>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare positionId: number;
  declare technicianId: number;
  declare sampleId: number;
  declare stateId: number | null;
  /** What is to be done, such as `radiated prescan`. */
  declare work: string;
  declare startsAt: Date;
  /** The first instant after it: touching bookings share none. */
  declare endsAt: Date;
  declare state: CreationOptional<'booked' | 'cancelled'>;
  declare cancelReason: CreationOptional<string | null>;
  declare createdBy: number;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineBooking(sequelize: Sequelize): void {
  Booking.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      positionId: { type: DataTypes.BIGINT.UNSIGNED, field: 'position_id', allowNull: false },
      technicianId: { type: DataTypes.BIGINT.UNSIGNED, field: 'technician_id', allowNull: false },
      sampleId: { type: DataTypes.BIGINT.UNSIGNED, field: 'sample_id', allowNull: false },
      stateId: { type: DataTypes.BIGINT.UNSIGNED, field: 'state_id', allowNull: true },
      work: { type: DataTypes.STRING(120), allowNull: false },
      startsAt: { type: DataTypes.DATE(3), field: 'starts_at', allowNull: false },
      endsAt: { type: DataTypes.DATE(3), field: 'ends_at', allowNull: false },
      state: { type: DataTypes.ENUM('booked', 'cancelled'), allowNull: false, defaultValue: 'booked' },
      cancelReason: { type: DataTypes.STRING(300), field: 'cancel_reason', allowNull: true },
      createdBy: { type: DataTypes.BIGINT.UNSIGNED, field: 'created_by', allowNull: false },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'Booking', tableName: 'bookings', timestamps: true },
  );
}
