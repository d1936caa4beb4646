import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Who did what, when; rows are only ever added. */
export class AuditEntryRow extends Model<
  InferAttributes<AuditEntryRow>,
  InferCreationAttributes<AuditEntryRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string | null;
  declare personId: string | null;
  declare action: string;
  declare itemKind: string;
  declare itemId: string;
  declare summary: CreationOptional<string>;
  declare details: CreationOptional<Record<string, unknown>>;
  /** Where the request came from, as far as that can be believed. */
  declare address: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineAuditEntry(sequelize: Sequelize): void {
  AuditEntryRow.init(
    {
      id: { type: DataTypes.BIGINT, autoIncrement: true, primaryKey: true },
      collaborationId: DataTypes.UUID,
      personId: DataTypes.UUID,
      action: DataTypes.TEXT,
      itemKind: DataTypes.TEXT,
      itemId: DataTypes.TEXT,
      summary: DataTypes.TEXT,
      details: DataTypes.JSONB,
      address: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'auditEntry',
      tableName: 'audit_entry',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
