import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { SampleDefinition } from '@/lib/schemas/samples';

/** One version of a saved selection of stars; versions are never changed. */
export class SampleRow extends Model<
  InferAttributes<SampleRow>,
  InferCreationAttributes<SampleRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare number: number;
  declare version: number;
  declare name: string;
  declare definition: SampleDefinition;
  declare digest: string;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineSample(sequelize: Sequelize): void {
  SampleRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      number: DataTypes.INTEGER,
      version: DataTypes.INTEGER,
      name: DataTypes.TEXT,
      definition: DataTypes.JSONB,
      digest: DataTypes.TEXT,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'sample',
      tableName: 'sample',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
