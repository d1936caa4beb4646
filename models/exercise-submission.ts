import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A run that was handed in; only a comment is added to it. */
export class ExerciseSubmissionRow extends Model<
  InferAttributes<ExerciseSubmissionRow>,
  InferCreationAttributes<ExerciseSubmissionRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare startId: string;
  declare number: number;
  declare runId: string;
  declare remark: string;
  declare submittedAt: CreationOptional<Date>;
  declare comment: CreationOptional<string | null>;
  declare commentedBy: CreationOptional<string | null>;
  declare commentedAt: CreationOptional<Date | null>;
}

export function defineExerciseSubmission(sequelize: Sequelize): void {
  ExerciseSubmissionRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      startId: DataTypes.UUID,
      number: DataTypes.INTEGER,
      runId: DataTypes.UUID,
      remark: DataTypes.TEXT,
      submittedAt: DataTypes.DATE,
      comment: DataTypes.TEXT,
      commentedBy: DataTypes.UUID,
      commentedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'exercise_submission',
      tableName: 'exercise_submission',
      underscored: true,
      timestamps: true,
      createdAt: 'submittedAt',
      updatedAt: false,
    },
  );
}
