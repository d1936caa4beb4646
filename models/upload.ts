import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** The original bytes of a file, with their SHA-256 and what reading them said. */
export class UploadRow extends Model<
  InferAttributes<UploadRow>,
  InferCreationAttributes<UploadRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare surveyId: string | null;
  declare kind: string;
  declare fileName: string;
  declare byteLength: number;
  declare sha256: string;
  declare state: string;
  declare settings: CreationOptional<Record<string, unknown>>;
  declare report: CreationOptional<Record<string, unknown>>;
  declare uploadedBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare storedAt: CreationOptional<Date | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawnBy: CreationOptional<string | null>;
}

export function defineUpload(sequelize: Sequelize): void {
  UploadRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      surveyId: DataTypes.UUID,
      kind: DataTypes.TEXT,
      fileName: DataTypes.TEXT,
      byteLength: DataTypes.BIGINT,
      sha256: DataTypes.TEXT,
      state: DataTypes.TEXT,
      settings: DataTypes.JSONB,
      report: DataTypes.JSONB,
      uploadedBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
      storedAt: DataTypes.DATE,
      withdrawnAt: DataTypes.DATE,
      withdrawnBy: DataTypes.UUID,
    },
    {
      sequelize,
      modelName: 'upload',
      tableName: 'upload',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
