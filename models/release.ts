import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { Author, ReleaseCheck } from '@/lib/schemas/releases';

/** Frozen runs under one title; public once it is published, and final from then on. */
export class ReleaseRow extends Model<
  InferAttributes<ReleaseRow>,
  InferCreationAttributes<ReleaseRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare number: number;
  /** End of the public address. */
  declare code: string;
  declare title: string;
  declare authors: Author[];
  declare abstract: CreationOptional<string>;
  declare licence: string;
  declare note: CreationOptional<string>;
  declare replacesId: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare signedOffBy: CreationOptional<string | null>;
  declare signedOffByName: CreationOptional<string | null>;
  declare signedOffAt: CreationOptional<Date | null>;
  declare agreedBy: CreationOptional<string | null>;
  declare agreedByName: CreationOptional<string | null>;
  declare agreedAt: CreationOptional<Date | null>;
  declare jobId: CreationOptional<string | null>;
  declare verification: CreationOptional<ReleaseCheck | null>;
  declare publishedBy: CreationOptional<string | null>;
  declare publishedByName: CreationOptional<string | null>;
  declare publishedAt: CreationOptional<Date | null>;
  declare withdrawnByName: CreationOptional<string | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
  declare withdrawnReason: CreationOptional<string | null>;
}

export class ReleaseRunRow extends Model<
  InferAttributes<ReleaseRunRow>,
  InferCreationAttributes<ReleaseRunRow>
> {
  declare releaseId: string;
  declare collaborationId: string;
  declare runId: string;
  declare position: number;
}

/** A file as it was when the release was published. */
export class ReleaseFileRow extends Model<
  InferAttributes<ReleaseFileRow>,
  InferCreationAttributes<ReleaseFileRow>
> {
  declare releaseId: string;
  declare collaborationId: string;
  declare position: number;
  declare name: string;
  declare mediaType: string;
  declare description: string;
  declare sha256: string;
  declare byteLength: number;
  declare bytes: Buffer;
}

export function defineRelease(sequelize: Sequelize): void {
  ReleaseRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      number: DataTypes.INTEGER,
      code: DataTypes.TEXT,
      title: DataTypes.TEXT,
      authors: DataTypes.JSONB,
      abstract: DataTypes.TEXT,
      licence: DataTypes.TEXT,
      note: DataTypes.TEXT,
      replacesId: DataTypes.UUID,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
      signedOffBy: DataTypes.UUID,
      signedOffByName: DataTypes.TEXT,
      signedOffAt: DataTypes.DATE,
      agreedBy: DataTypes.UUID,
      agreedByName: DataTypes.TEXT,
      agreedAt: DataTypes.DATE,
      jobId: DataTypes.UUID,
      verification: DataTypes.JSONB,
      publishedBy: DataTypes.UUID,
      publishedByName: DataTypes.TEXT,
      publishedAt: DataTypes.DATE,
      withdrawnByName: DataTypes.TEXT,
      withdrawnAt: DataTypes.DATE,
      withdrawnReason: DataTypes.TEXT,
    },
    {
      sequelize,
      modelName: 'release',
      tableName: 'release',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
  ReleaseRunRow.init(
    {
      releaseId: { type: DataTypes.UUID, primaryKey: true },
      collaborationId: DataTypes.UUID,
      runId: DataTypes.UUID,
      position: { type: DataTypes.INTEGER, primaryKey: true },
    },
    {
      sequelize,
      modelName: 'releaseRun',
      tableName: 'release_run',
      underscored: true,
      timestamps: false,
    },
  );
  ReleaseFileRow.init(
    {
      releaseId: { type: DataTypes.UUID, primaryKey: true },
      collaborationId: DataTypes.UUID,
      position: DataTypes.INTEGER,
      name: { type: DataTypes.TEXT, primaryKey: true },
      mediaType: DataTypes.TEXT,
      description: DataTypes.TEXT,
      sha256: DataTypes.TEXT,
      byteLength: DataTypes.INTEGER,
      bytes: DataTypes.BLOB,
    },
    {
      sequelize,
      modelName: 'releaseFile',
      tableName: 'release_file',
      underscored: true,
      timestamps: false,
    },
  );
}
