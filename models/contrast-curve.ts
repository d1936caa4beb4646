import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Faintest detectable contrast against separation, of one target at one epoch. */
export class ContrastCurveRow extends Model<
  InferAttributes<ContrastCurveRow>,
  InferCreationAttributes<ContrastCurveRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare targetId: string;
  declare uploadId: CreationOptional<string | null>;
  declare band: string;
  declare epoch: CreationOptional<string | null>;
  declare nSigma: number;
  declare separationArcsec: number[];
  declare contrastMag: number[];
  declare coverage: CreationOptional<number[] | null>;
  declare instrument: CreationOptional<string | null>;
  declare reference: CreationOptional<string | null>;
  declare digest: string;
  declare replacedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineContrastCurve(sequelize: Sequelize): void {
  ContrastCurveRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      targetId: DataTypes.UUID,
      uploadId: DataTypes.UUID,
      band: DataTypes.TEXT,
      epoch: DataTypes.TEXT,
      nSigma: DataTypes.DOUBLE,
      separationArcsec: DataTypes.ARRAY(DataTypes.DOUBLE),
      contrastMag: DataTypes.ARRAY(DataTypes.DOUBLE),
      coverage: DataTypes.ARRAY(DataTypes.DOUBLE),
      instrument: DataTypes.TEXT,
      reference: DataTypes.TEXT,
      digest: DataTypes.TEXT,
      replacedAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'contrastCurve',
      tableName: 'contrast_curve',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
