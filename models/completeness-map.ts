import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Probability of detection on nodes of mass and semi-major axis, as uint16 = round(65535 C), little-endian, row-major [mass, semi-major axis]. */
export class CompletenessMapRow extends Model<
  InferAttributes<CompletenessMapRow>,
  InferCreationAttributes<CompletenessMapRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare digest: string;
  declare origin: 'computed' | 'uploaded';
  declare engineVersion: string;
  declare massMjup: number[];
  declare semiMajorAxisAu: number[];
  declare scale: CreationOptional<number>;
  declare nodeValues: Buffer;
  declare checksum: string;
  declare inputs: Record<string, unknown>;
  declare report: CreationOptional<Record<string, unknown>>;
  declare createdAt: CreationOptional<Date>;
}

export function defineCompletenessMap(sequelize: Sequelize): void {
  CompletenessMapRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      digest: DataTypes.TEXT,
      origin: DataTypes.TEXT,
      engineVersion: DataTypes.TEXT,
      massMjup: DataTypes.ARRAY(DataTypes.DOUBLE),
      semiMajorAxisAu: DataTypes.ARRAY(DataTypes.DOUBLE),
      scale: DataTypes.INTEGER,
      nodeValues: DataTypes.BLOB,
      checksum: DataTypes.TEXT,
      inputs: DataTypes.JSONB,
      report: DataTypes.JSONB,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'completenessMap',
      tableName: 'completeness_map',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
