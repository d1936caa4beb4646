import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Where a candidate stood from its star on one day. */
export class CompanionObservationRow extends Model<
  InferAttributes<CompanionObservationRow>,
  InferCreationAttributes<CompanionObservationRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare companionId: string;
  declare uploadId: CreationOptional<string | null>;
  /** YYYY-MM-DD. */
  declare observedOn: string;
  declare separationArcsec: number;
  declare separationErrorArcsec: CreationOptional<number | null>;
  declare positionAngleDeg: number;
  declare positionAngleErrorDeg: CreationOptional<number | null>;
  declare band: CreationOptional<string | null>;
  declare contrastMag: CreationOptional<number | null>;
  declare contrastErrorMag: CreationOptional<number | null>;
  declare source: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineCompanionObservation(sequelize: Sequelize): void {
  CompanionObservationRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      companionId: DataTypes.UUID,
      uploadId: DataTypes.UUID,
      observedOn: DataTypes.DATEONLY,
      separationArcsec: DataTypes.DOUBLE,
      separationErrorArcsec: DataTypes.DOUBLE,
      positionAngleDeg: DataTypes.DOUBLE,
      positionAngleErrorDeg: DataTypes.DOUBLE,
      band: DataTypes.TEXT,
      contrastMag: DataTypes.DOUBLE,
      contrastErrorMag: DataTypes.DOUBLE,
      source: DataTypes.TEXT,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'companionObservation',
      tableName: 'companion_observation',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
