import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { MatchEvidence } from '@/lib/schemas/stars';

export type MapState = 'none' | 'waiting' | 'ready' | 'failed';

/** A star as one survey lists it. */
export class TargetRow extends Model<
  InferAttributes<TargetRow>,
  InferCreationAttributes<TargetRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare surveyId: string;
  declare starId: string;
  /** How it was found to be a star that another survey had brought; null for the first. */
  declare starEvidence: CreationOptional<MatchEvidence | null>;
  declare uploadId: CreationOptional<string | null>;
  declare name: string;
  declare foldedName: string;
  declare otherNames: CreationOptional<string[]>;
  declare gaiaDr3Id: CreationOptional<string | null>;
  declare raDeg: CreationOptional<number | null>;
  declare decDeg: CreationOptional<number | null>;
  declare distancePc: CreationOptional<number | null>;
  declare distanceErrorPc: CreationOptional<number | null>;
  declare parallaxMas: CreationOptional<number | null>;
  declare parallaxErrorMas: CreationOptional<number | null>;
  declare ageMyr: CreationOptional<number | null>;
  declare ageLowerMyr: CreationOptional<number | null>;
  declare ageUpperMyr: CreationOptional<number | null>;
  declare ageMinMyr: CreationOptional<number | null>;
  declare ageMaxMyr: CreationOptional<number | null>;
  declare hostMassMsun: CreationOptional<number | null>;
  declare spectralType: CreationOptional<string | null>;
  declare movingGroup: CreationOptional<string | null>;
  declare magnitudes: CreationOptional<
    Record<string, { valueMag: number; errorMag: number | null }>
  >;
  declare attributes: CreationOptional<Record<string, unknown>>;
  declare leftOutReason: CreationOptional<string | null>;
  declare mapId: CreationOptional<string | null>;
  declare mapState: CreationOptional<MapState>;
  declare mapFault: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineTarget(sequelize: Sequelize): void {
  TargetRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      surveyId: DataTypes.UUID,
      starId: DataTypes.UUID,
      starEvidence: DataTypes.JSONB,
      uploadId: DataTypes.UUID,
      name: DataTypes.TEXT,
      foldedName: DataTypes.TEXT,
      otherNames: DataTypes.ARRAY(DataTypes.TEXT),
      gaiaDr3Id: DataTypes.TEXT,
      raDeg: DataTypes.DOUBLE,
      decDeg: DataTypes.DOUBLE,
      distancePc: DataTypes.DOUBLE,
      distanceErrorPc: DataTypes.DOUBLE,
      parallaxMas: DataTypes.DOUBLE,
      parallaxErrorMas: DataTypes.DOUBLE,
      ageMyr: DataTypes.DOUBLE,
      ageLowerMyr: DataTypes.DOUBLE,
      ageUpperMyr: DataTypes.DOUBLE,
      ageMinMyr: DataTypes.DOUBLE,
      ageMaxMyr: DataTypes.DOUBLE,
      hostMassMsun: DataTypes.DOUBLE,
      spectralType: DataTypes.TEXT,
      movingGroup: DataTypes.TEXT,
      magnitudes: DataTypes.JSONB,
      attributes: DataTypes.JSONB,
      leftOutReason: DataTypes.TEXT,
      mapId: DataTypes.UUID,
      mapState: DataTypes.TEXT,
      mapFault: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'target',
      tableName: 'target',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
