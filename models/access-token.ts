import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A bearer token of one person in one collaboration; only its hash is kept. */
export class AccessTokenRow extends Model<
  InferAttributes<AccessTokenRow>,
  InferCreationAttributes<AccessTokenRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare personId: string;
  declare name: string;
  declare scopes: string[];
  declare tokenHash: string;
  declare ending: string;
  declare createdAt: CreationOptional<Date>;
  declare expiresAt: Date;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare revokedAt: CreationOptional<Date | null>;
}

export function defineAccessToken(sequelize: Sequelize): void {
  AccessTokenRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      personId: DataTypes.UUID,
      name: DataTypes.TEXT,
      scopes: DataTypes.ARRAY(DataTypes.TEXT),
      tokenHash: DataTypes.TEXT,
      ending: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      expiresAt: DataTypes.DATE,
      lastUsedAt: DataTypes.DATE,
      revokedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'accessToken',
      tableName: 'access_token',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
