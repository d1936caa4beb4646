import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { Population } from '@/lib/population';

/** One version of a population; versions are never changed. */
export class PopulationRow extends Model<
  InferAttributes<PopulationRow>,
  InferCreationAttributes<PopulationRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare number: number;
  declare version: number;
  declare name: string;
  declare note: CreationOptional<string>;
  declare definition: Population;
  declare digest: string;
  declare isShared: CreationOptional<boolean>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function definePopulation(sequelize: Sequelize): void {
  PopulationRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      number: DataTypes.INTEGER,
      version: DataTypes.INTEGER,
      name: DataTypes.TEXT,
      note: DataTypes.TEXT,
      definition: DataTypes.JSONB,
      digest: DataTypes.TEXT,
      isShared: DataTypes.BOOLEAN,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'population',
      tableName: 'population',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
