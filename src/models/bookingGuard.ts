import { DataTypes, type InferAttributes, type InferCreationAttributes, Model, type Sequelize } from 'sequelize';

export class BookingGuard extends Model<InferAttributes<BookingGuard>, InferCreationAttributes<BookingGuard>> {
  /** `person-12`, `position-3`. */
  declare resource: string;
  /** UTC. */
  declare day: string;
  declare touched: number;
}

export function defineBookingGuard(sequelize: Sequelize): void {
  BookingGuard.init(
    {
      resource: { type: DataTypes.STRING(40), primaryKey: true, allowNull: false },
      day: { type: DataTypes.DATEONLY, primaryKey: true, allowNull: false },
      touched: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false, defaultValue: 0 },
    },
    { sequelize, modelName: 'BookingGuard', tableName: 'booking_guards', timestamps: false },
  );
}
