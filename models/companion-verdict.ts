import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { CompanionRow } from './companion';

/** How a mass or an axis came about; null where there is none. */
export type ValueOrigin = 'file' | 'given' | 'photometry' | 'separation';

/** One decision about a candidate, or a proposal of one; never changed. */
export class CompanionVerdictRow extends Model<
  InferAttributes<CompanionVerdictRow>,
  InferCreationAttributes<CompanionVerdictRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare companionId: string;
  declare number: number;
  declare isProposal: CreationOptional<boolean>;
  declare status: CompanionRow['status'];
  declare probability: CreationOptional<number | null>;
  declare massMjup: CreationOptional<number | null>;
  declare massErrorLowerMjup: CreationOptional<number | null>;
  declare massErrorUpperMjup: CreationOptional<number | null>;
  declare massFrom: CreationOptional<ValueOrigin | null>;
  declare semiMajorAxisAu: CreationOptional<number | null>;
  declare semiMajorAxisErrorLowerAu: CreationOptional<number | null>;
  declare semiMajorAxisErrorUpperAu: CreationOptional<number | null>;
  declare semiMajorAxisFrom: CreationOptional<ValueOrigin | null>;
  declare reason: string;
  /** The file that states it; null for a verdict given by a person. */
  declare uploadId: CreationOptional<string | null>;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineCompanionVerdict(sequelize: Sequelize): void {
  CompanionVerdictRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      companionId: DataTypes.UUID,
      number: DataTypes.INTEGER,
      isProposal: DataTypes.BOOLEAN,
      status: DataTypes.TEXT,
      probability: DataTypes.DOUBLE,
      massMjup: DataTypes.DOUBLE,
      massErrorLowerMjup: DataTypes.DOUBLE,
      massErrorUpperMjup: DataTypes.DOUBLE,
      massFrom: DataTypes.TEXT,
      semiMajorAxisAu: DataTypes.DOUBLE,
      semiMajorAxisErrorLowerAu: DataTypes.DOUBLE,
      semiMajorAxisErrorUpperAu: DataTypes.DOUBLE,
      semiMajorAxisFrom: DataTypes.TEXT,
      reason: DataTypes.TEXT,
      uploadId: DataTypes.UUID,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'companionVerdict',
      tableName: 'companion_verdict',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
