import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A whole collaboration as one archive, whose bytes lie in parts beside it. */
export class CollaborationExportRow extends Model<
  InferAttributes<CollaborationExportRow>,
  InferCreationAttributes<CollaborationExportRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare jobId: string;
  declare askedBy: CreationOptional<string | null>;
  declare askedByName: string;
  declare createdAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
  declare expiresAt: CreationOptional<Date | null>;
  /** The driver gives whole numbers of this size as text. */
  declare byteLength: CreationOptional<string | number | null>;
  declare sha256: CreationOptional<string | null>;
}

/** The wish of an owner that the collaboration be deleted, while it can still be taken back. */
export class DepartureRow extends Model<
  InferAttributes<DepartureRow>,
  InferCreationAttributes<DepartureRow>
> {
  declare collaborationId: string;
  declare askedBy: CreationOptional<string | null>;
  declare askedByName: string;
  declare askedAt: CreationOptional<Date>;
  declare dueAt: Date;
}

export function defineDeparture(sequelize: Sequelize): void {
  CollaborationExportRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      jobId: DataTypes.UUID,
      askedBy: DataTypes.UUID,
      askedByName: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      finishedAt: DataTypes.DATE,
      expiresAt: DataTypes.DATE,
      byteLength: DataTypes.BIGINT,
      sha256: DataTypes.TEXT,
    },
    {
      sequelize,
      modelName: 'collaborationExport',
      tableName: 'collaboration_export',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
  DepartureRow.init(
    {
      collaborationId: { type: DataTypes.UUID, primaryKey: true },
      askedBy: DataTypes.UUID,
      askedByName: DataTypes.TEXT,
      askedAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
      dueAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'departure',
      tableName: 'departure',
      underscored: true,
      timestamps: false,
    },
  );
}
