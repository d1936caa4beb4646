import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** What somebody said about one thing; a reply names the note that began its thread. */
export class NoteRow extends Model<InferAttributes<NoteRow>, InferCreationAttributes<NoteRow>> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare surveyId: CreationOptional<string | null>;
  declare starId: CreationOptional<string | null>;
  declare analysisId: CreationOptional<string | null>;
  declare runId: CreationOptional<string | null>;
  declare companionId: CreationOptional<string | null>;
  declare parentId: CreationOptional<string | null>;
  declare body: string;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare editedAt: CreationOptional<Date | null>;
  declare removedAt: CreationOptional<Date | null>;
  declare resolvedAt: CreationOptional<Date | null>;
  declare resolvedBy: CreationOptional<string | null>;
}

export function defineNote(sequelize: Sequelize): void {
  NoteRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      surveyId: DataTypes.UUID,
      starId: DataTypes.UUID,
      analysisId: DataTypes.UUID,
      runId: DataTypes.UUID,
      companionId: DataTypes.UUID,
      parentId: DataTypes.UUID,
      body: DataTypes.TEXT,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
      editedAt: DataTypes.DATE,
      removedAt: DataTypes.DATE,
      resolvedAt: DataTypes.DATE,
      resolvedBy: DataTypes.UUID,
    },
    {
      sequelize,
      modelName: 'note',
      tableName: 'note',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
