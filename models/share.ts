import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { ShareScope } from '@/lib/schemas/sharing';

/** A survey that one collaboration offered to another; its collaboration is the one that offers. */
export class ShareRow extends Model<InferAttributes<ShareRow>, InferCreationAttributes<ShareRow>> {
  declare id: CreationOptional<string>;
  /** null once the owning collaboration, or its survey, is no more. */
  declare collaborationId: string | null;
  declare surveyId: string | null;
  declare receiverId: string;
  declare scope: ShareScope;
  declare ownerName: string;
  declare surveyName: string;
  declare note: CreationOptional<string>;
  declare attribution: string;
  declare state: CreationOptional<'offered' | 'accepted' | 'refused' | 'expired' | 'withdrawn'>;
  declare offeredBy: CreationOptional<string | null>;
  declare offeredAt: CreationOptional<Date>;
  declare expiresAt: Date;
  declare decidedBy: CreationOptional<string | null>;
  declare decidedAt: CreationOptional<Date | null>;
  declare decidedWhy: CreationOptional<string | null>;
  /** Digest of everything that was copied. */
  declare sourceVersion: CreationOptional<string | null>;
  declare copiedAt: CreationOptional<Date | null>;
  declare withdrawnBy: CreationOptional<string | null>;
  declare withdrawnAt: CreationOptional<Date | null>;
  /** From when nothing new may rest on the copy; may lie ahead. */
  declare withdrawnFrom: CreationOptional<Date | null>;
  declare withdrawnWhy: CreationOptional<string | null>;
}

export function defineShare(sequelize: Sequelize): void {
  ShareRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      surveyId: DataTypes.UUID,
      receiverId: DataTypes.UUID,
      scope: DataTypes.TEXT,
      ownerName: DataTypes.TEXT,
      surveyName: DataTypes.TEXT,
      note: DataTypes.TEXT,
      attribution: DataTypes.TEXT,
      state: DataTypes.TEXT,
      offeredBy: DataTypes.UUID,
      offeredAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
      expiresAt: DataTypes.DATE,
      decidedBy: DataTypes.UUID,
      decidedAt: DataTypes.DATE,
      decidedWhy: DataTypes.TEXT,
      sourceVersion: DataTypes.TEXT,
      copiedAt: DataTypes.DATE,
      withdrawnBy: DataTypes.UUID,
      withdrawnAt: DataTypes.DATE,
      withdrawnFrom: DataTypes.DATE,
      withdrawnWhy: DataTypes.TEXT,
    },
    {
      sequelize,
      modelName: 'share',
      tableName: 'share',
      underscored: true,
      timestamps: false,
    },
  );
}
