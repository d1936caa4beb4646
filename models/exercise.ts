import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { ChangeablePart } from '@/lib/schemas/exercises';
/** An analysis set as a task, by the run that submissions are held against. */
export class ExerciseRow extends Model<
  InferAttributes<ExerciseRow>,
  InferCreationAttributes<ExerciseRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare number: number;
  declare title: string;
  declare task: string;
  declare mayChange: ChangeablePart[];
  declare dueOn: string | null;
  declare isShared: boolean;
  declare runId: string;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

export function defineExercise(sequelize: Sequelize): void {
  ExerciseRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      number: DataTypes.INTEGER,
      title: DataTypes.TEXT,
      task: DataTypes.TEXT,
      mayChange: DataTypes.ARRAY(DataTypes.TEXT),
      dueOn: DataTypes.DATEONLY,
      isShared: DataTypes.BOOLEAN,
      runId: DataTypes.UUID,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
      updatedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'exercise',
      tableName: 'exercise',
      underscored: true,
      timestamps: true,
    },
  );
}
