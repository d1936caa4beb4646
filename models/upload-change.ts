import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** What one file changed: a row that it brought or replaced, with what stood there before. */
export class UploadChangeRow extends Model<
  InferAttributes<UploadChangeRow>,
  InferCreationAttributes<UploadChangeRow>
> {
  /** Counts up: the order in which the changes were made. */
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare uploadId: string;
  declare itemKind: 'target' | 'map' | 'companion';
  /** Of the target, for its map too; or of the companion. */
  declare itemId: string;
  /** Null where nothing stood there. */
  declare before: CreationOptional<Record<string, unknown> | null>;
}

export function defineUploadChange(sequelize: Sequelize): void {
  UploadChangeRow.init(
    {
      id: { type: DataTypes.BIGINT, autoIncrement: true, primaryKey: true },
      collaborationId: DataTypes.UUID,
      uploadId: DataTypes.UUID,
      itemKind: DataTypes.TEXT,
      itemId: DataTypes.UUID,
      before: DataTypes.JSONB,
    },
    {
      sequelize,
      modelName: 'uploadChange',
      tableName: 'upload_change',
      underscored: true,
      timestamps: false,
    },
  );
}
