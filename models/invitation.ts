import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A way into a collaboration, sent by mail; only the hash of its code is kept. */
export class InvitationRow extends Model<
  InferAttributes<InvitationRow>,
  InferCreationAttributes<InvitationRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare email: string;
  declare roles: string[];
  declare codeHash: string;
  declare invitedBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare expiresAt: Date;
  declare acceptedAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;
}

export function defineInvitation(sequelize: Sequelize): void {
  InvitationRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      email: DataTypes.TEXT,
      roles: DataTypes.ARRAY(DataTypes.TEXT),
      codeHash: DataTypes.TEXT,
      invitedBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
      expiresAt: DataTypes.DATE,
      acceptedAt: DataTypes.DATE,
      revokedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'invitation',
      tableName: 'invitation',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
