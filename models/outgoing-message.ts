import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export type MessageState = 'waiting' | 'sending' | 'sent' | 'failed' | 'withdrawn';

/** A message that waits, is on its way, or has ended; its contents are sealed until then. */
export class OutgoingMessageRow extends Model<
  InferAttributes<OutgoingMessageRow>,
  InferCreationAttributes<OutgoingMessageRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string | null;
  declare personId: string | null;
  declare kind: string;
  declare toAddress: string;
  declare toName: CreationOptional<string>;
  /** What it tells of, as "invitation:…": so that it can be taken back while it waits. */
  declare about: CreationOptional<string>;
  declare sealed: Buffer | null;
  declare state: CreationOptional<MessageState>;
  declare attempts: CreationOptional<number>;
  declare dueAt: CreationOptional<Date>;
  declare uselessAfter: CreationOptional<Date | null>;
  declare claimToken: CreationOptional<string | null>;
  declare claimedUntil: CreationOptional<Date | null>;
  declare fault: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare endedAt: CreationOptional<Date | null>;
}

export function defineOutgoingMessage(sequelize: Sequelize): void {
  OutgoingMessageRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      personId: DataTypes.UUID,
      kind: DataTypes.TEXT,
      toAddress: DataTypes.TEXT,
      toName: DataTypes.TEXT,
      about: DataTypes.TEXT,
      sealed: DataTypes.BLOB,
      state: DataTypes.TEXT,
      attempts: DataTypes.INTEGER,
      dueAt: DataTypes.DATE,
      uselessAfter: DataTypes.DATE,
      claimToken: DataTypes.UUID,
      claimedUntil: DataTypes.DATE,
      fault: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      endedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'outgoingMessage',
      tableName: 'outbox_message',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
