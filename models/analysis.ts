import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';

/** A question with its settings; its runs are its history. */
export class AnalysisRow extends Model<
  InferAttributes<AnalysisRow>,
  InferCreationAttributes<AnalysisRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare number: number;
  declare name: string;
  declare recipe: AnalysisRecipe;
  declare parentId: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineAnalysis(sequelize: Sequelize): void {
  AnalysisRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      number: DataTypes.INTEGER,
      name: DataTypes.TEXT,
      recipe: DataTypes.JSONB,
      parentId: DataTypes.UUID,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
      updatedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'analysis',
      tableName: 'analysis',
      underscored: true,
      timestamps: true,
    },
  );
}
