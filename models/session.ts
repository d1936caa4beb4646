import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** One sign-in. Each request looks its row up, so deleting the row ends it. */
export class SessionRow extends Model<
  InferAttributes<SessionRow>,
  InferCreationAttributes<SessionRow>
> {
  declare id: CreationOptional<string>;
  declare personId: string;
  declare userAgent: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare lastSeenAt: CreationOptional<Date>;
  declare expiresAt: Date;
}

export function defineSession(sequelize: Sequelize): void {
  SessionRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      personId: DataTypes.UUID,
      userAgent: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      lastSeenAt: DataTypes.DATE,
      expiresAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'session',
      tableName: 'session',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
