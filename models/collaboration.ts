import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A group of people, and the wall round all that is theirs. */
export class CollaborationRow extends Model<
  InferAttributes<CollaborationRow>,
  InferCreationAttributes<CollaborationRow>
> {
  declare id: CreationOptional<string>;
  declare slug: string;
  declare name: string;
  declare settings: CreationOptional<Record<string, unknown>>;
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineCollaboration(sequelize: Sequelize): void {
  CollaborationRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      slug: DataTypes.TEXT,
      name: DataTypes.TEXT,
      settings: DataTypes.JSONB,
      archivedAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'collaboration',
      tableName: 'collaboration',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
