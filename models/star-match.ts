import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { MatchEvidence, MatchState } from '@/lib/schemas/stars';

/** Two stars that may be one, and what a person decided. */
export class StarMatchRow extends Model<
  InferAttributes<StarMatchRow>,
  InferCreationAttributes<StarMatchRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  /** The smaller of the two ids. */
  declare firstStarId: string;
  declare secondStarId: string;
  declare state: MatchState;
  declare evidence: MatchEvidence;
  /** The star whose targets went to the other, while the pair is confirmed. */
  declare absorbedStarId: CreationOptional<string | null>;
  declare movedTargetIds: CreationOptional<string[]>;
  declare decidedBy: CreationOptional<string | null>;
  declare decidedAt: CreationOptional<Date | null>;
  declare why: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineStarMatch(sequelize: Sequelize): void {
  StarMatchRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      firstStarId: DataTypes.UUID,
      secondStarId: DataTypes.UUID,
      state: DataTypes.TEXT,
      evidence: DataTypes.JSONB,
      absorbedStarId: DataTypes.UUID,
      movedTargetIds: DataTypes.ARRAY(DataTypes.UUID),
      decidedBy: DataTypes.UUID,
      decidedAt: DataTypes.DATE,
      why: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'starMatch',
      tableName: 'star_match',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
