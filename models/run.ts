import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { RunInputs, RunResult } from '@/lib/schemas/runs';

/** One computation of an analysis; immutable once it holds a result. */
export class RunRow extends Model<InferAttributes<RunRow>, InferCreationAttributes<RunRow>> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare analysisId: string;
  declare number: number;
  declare jobId: string;
  declare recipe: AnalysisRecipe;
  declare seed: string;
  declare engineVersion: string;
  declare inputs: CreationOptional<RunInputs | null>;
  declare inputsDigest: CreationOptional<string | null>;
  declare result: CreationOptional<RunResult | null>;
  declare resultDigest: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
}

export function defineRun(sequelize: Sequelize): void {
  RunRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      analysisId: DataTypes.UUID,
      number: DataTypes.INTEGER,
      jobId: DataTypes.UUID,
      recipe: DataTypes.JSONB,
      seed: DataTypes.TEXT,
      engineVersion: DataTypes.TEXT,
      inputs: DataTypes.JSONB,
      inputsDigest: DataTypes.TEXT,
      result: DataTypes.JSONB,
      resultDigest: DataTypes.TEXT,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
      finishedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'run',
      tableName: 'run',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
