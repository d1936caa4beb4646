import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { BundleExpectation } from '@/lib/schemas/bundles';
import type { FreezeCheck } from '@/lib/schemas/releases';

/** A run that may be released, with its inputs as they were: a bundle's bytes. */
export class FrozenRunRow extends Model<
  InferAttributes<FrozenRunRow>,
  InferCreationAttributes<FrozenRunRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare runId: string;
  /** Why it was frozen although a check was not met. */
  declare reason: CreationOptional<string | null>;
  declare checks: FreezeCheck[];
  declare snapshot: Buffer;
  declare snapshotSha256: string;
  declare frozenBy: CreationOptional<string | null>;
  declare frozenByName: string;
  declare frozenAt: CreationOptional<Date>;
}

/** A run that was made anew from a bundle, and what the bundle says that it must give. */
export class BundleImportRow extends Model<
  InferAttributes<BundleImportRow>,
  InferCreationAttributes<BundleImportRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare runId: string;
  declare fileSha256: string;
  declare title: string;
  declare expected: BundleExpectation;
  declare importedBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineFrozenRun(sequelize: Sequelize): void {
  FrozenRunRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      runId: DataTypes.UUID,
      reason: DataTypes.TEXT,
      checks: DataTypes.JSONB,
      snapshot: DataTypes.BLOB,
      snapshotSha256: DataTypes.TEXT,
      frozenBy: DataTypes.UUID,
      frozenByName: DataTypes.TEXT,
      frozenAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
    },
    {
      sequelize,
      modelName: 'frozenRun',
      tableName: 'frozen_run',
      underscored: true,
      timestamps: false,
    },
  );
  BundleImportRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      runId: DataTypes.UUID,
      fileSha256: DataTypes.TEXT,
      title: DataTypes.TEXT,
      expected: DataTypes.JSONB,
      importedBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'bundleImport',
      tableName: 'bundle_import',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
