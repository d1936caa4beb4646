import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { CombinationDefinition } from '@/lib/schemas/combinations';

/** One version of several surveys taken as one; versions are never changed. */
export class CombinationRow extends Model<
  InferAttributes<CombinationRow>,
  InferCreationAttributes<CombinationRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare number: number;
  declare version: number;
  declare name: string;
  declare definition: CombinationDefinition;
  declare digest: string;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineCombination(sequelize: Sequelize): void {
  CombinationRow.init(
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
      modelName: 'combination',
      tableName: 'combination',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
