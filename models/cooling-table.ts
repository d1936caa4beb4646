import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { StartCondition } from '@/lib/schemas/cooling';

/** Absolute magnitude against companion mass and age; missing entries are null. */
export class CoolingTableRow extends Model<
  InferAttributes<CoolingTableRow>,
  InferCreationAttributes<CoolingTableRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare uploadId: CreationOptional<string | null>;
  declare name: string;
  declare massMjup: number[];
  declare ageMyr: number[];
  declare magnitudes: Record<string, (number | null)[]>;
  declare digest: string;
  /** Initial entropy of what the table follows. */
  declare startCondition: CreationOptional<StartCondition>;
  declare createdAt: CreationOptional<Date>;
}

export function defineCoolingTable(sequelize: Sequelize): void {
  CoolingTableRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      uploadId: DataTypes.UUID,
      name: DataTypes.TEXT,
      massMjup: DataTypes.ARRAY(DataTypes.DOUBLE),
      ageMyr: DataTypes.ARRAY(DataTypes.DOUBLE),
      magnitudes: DataTypes.JSONB,
      digest: DataTypes.TEXT,
      startCondition: { type: DataTypes.TEXT, defaultValue: 'unstated' },
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'coolingTable',
      tableName: 'cooling_table',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
