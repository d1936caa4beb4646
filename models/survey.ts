import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { MapSettings } from '@/lib/schemas/surveys';

/** A programme of observations. */
export class SurveyRow extends Model<
  InferAttributes<SurveyRow>,
  InferCreationAttributes<SurveyRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare slug: string;
  declare name: string;
  declare description: CreationOptional<string>;
  declare band: string;
  declare observedFrom: CreationOptional<number | null>;
  declare observedTo: CreationOptional<number | null>;
  declare leadId: CreationOptional<string | null>;
  declare position: CreationOptional<number>;
  declare mapSettings: MapSettings;
  /** Of a survey that another collaboration shares: it is read only here. */
  declare shareId: CreationOptional<string | null>;
  /** A moment ahead is the end of a shared survey that its owner has announced. */
  declare archivedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineSurvey(sequelize: Sequelize): void {
  SurveyRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      slug: DataTypes.TEXT,
      name: DataTypes.TEXT,
      description: DataTypes.TEXT,
      band: DataTypes.TEXT,
      observedFrom: DataTypes.INTEGER,
      observedTo: DataTypes.INTEGER,
      leadId: DataTypes.UUID,
      position: DataTypes.INTEGER,
      mapSettings: DataTypes.JSONB,
      shareId: DataTypes.UUID,
      archivedAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'survey',
      tableName: 'survey',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
