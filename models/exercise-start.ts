import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Somebody who began an exercise, with the draft that is their own. */
export class ExerciseStartRow extends Model<
  InferAttributes<ExerciseStartRow>,
  InferCreationAttributes<ExerciseStartRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare exerciseId: string;
  declare personId: string;
  declare analysisId: string;
  declare startedAt: CreationOptional<Date>;
}

export function defineExerciseStart(sequelize: Sequelize): void {
  ExerciseStartRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      exerciseId: DataTypes.UUID,
      personId: DataTypes.UUID,
      analysisId: DataTypes.UUID,
      startedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'exercise_start',
      tableName: 'exercise_start',
      underscored: true,
      timestamps: true,
      createdAt: 'startedAt',
      updatedAt: false,
    },
  );
}
