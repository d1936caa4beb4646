import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A private address for somebody without an account; the token itself is not kept. */
export class GuestLinkRow extends Model<
  InferAttributes<GuestLinkRow>,
  InferCreationAttributes<GuestLinkRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  /** What it opens: a release or a frozen run, one of the two. */
  declare releaseId: CreationOptional<string | null>;
  declare runId: CreationOptional<string | null>;
  /** For whom: "referee 1". */
  declare label: string;
  declare tokenHash: string;
  declare tokenEnding: string;
  declare expiresAt: Date;
  declare revokedAt: CreationOptional<Date | null>;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export class GuestNoteRow extends Model<
  InferAttributes<GuestNoteRow>,
  InferCreationAttributes<GuestNoteRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare linkId: string;
  /** As the guest signs. */
  declare name: string;
  declare body: string;
  declare createdAt: CreationOptional<Date>;
}

export function defineGuestLink(sequelize: Sequelize): void {
  GuestLinkRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      releaseId: DataTypes.UUID,
      runId: DataTypes.UUID,
      label: DataTypes.TEXT,
      tokenHash: DataTypes.TEXT,
      tokenEnding: DataTypes.TEXT,
      expiresAt: DataTypes.DATE,
      revokedAt: DataTypes.DATE,
      lastUsedAt: DataTypes.DATE,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'guestLink',
      tableName: 'guest_link',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
  GuestNoteRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      linkId: DataTypes.UUID,
      name: DataTypes.TEXT,
      body: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'guestNote',
      tableName: 'guest_note',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
