import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { StudyInputs } from '@/lib/schemas/studies';
import type { StudyResult } from '@/lib/schemas/study-results';
import type { StudyKind, StudySettings } from '@/lib/schemas/study-settings';

/** A further question of a finished run; immutable once it holds a result. */
export class StudyRow extends Model<InferAttributes<StudyRow>, InferCreationAttributes<StudyRow>> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare runId: string;
  declare number: number;
  declare jobId: string;
  declare kind: StudyKind;
  declare settings: StudySettings;
  declare settingsDigest: string;
  declare seed: string;
  declare engineVersion: string;
  declare inputs: CreationOptional<StudyInputs | null>;
  declare inputsDigest: CreationOptional<string | null>;
  declare result: CreationOptional<StudyResult | null>;
  declare resultDigest: CreationOptional<string | null>;
  /** One sentence of the result, for lists. */
  declare headline: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
}

export function defineStudy(sequelize: Sequelize): void {
  StudyRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      runId: DataTypes.UUID,
      number: DataTypes.INTEGER,
      jobId: DataTypes.UUID,
      kind: DataTypes.TEXT,
      settings: DataTypes.JSONB,
      settingsDigest: DataTypes.TEXT,
      seed: DataTypes.TEXT,
      engineVersion: DataTypes.TEXT,
      inputs: DataTypes.JSONB,
      inputsDigest: DataTypes.TEXT,
      result: DataTypes.JSONB,
      resultDigest: DataTypes.TEXT,
      headline: DataTypes.TEXT,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
      finishedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'study',
      tableName: 'study',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
