import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { AdoptedQuantity, AgeValue, DistanceValue } from '@/lib/schemas/stars';

/** One numbered state of the adopted ages or distances; never changed. */
export class ValueTableRow extends Model<
  InferAttributes<ValueTableRow>,
  InferCreationAttributes<ValueTableRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare quantity: AdoptedQuantity;
  declare number: number;
  declare why: string;
  declare createdBy: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

/** What a table says anew of one star; what it does not say stands as in the tables before it. */
export class AdoptedValueRow extends Model<
  InferAttributes<AdoptedValueRow>,
  InferCreationAttributes<AdoptedValueRow>
> {
  declare tableId: string;
  declare collaborationId: string;
  declare starId: string;
  /** null: each survey's own value holds again. */
  declare value: AgeValue | DistanceValue | null;
  declare source: string;
}

export function defineValueTable(sequelize: Sequelize): void {
  ValueTableRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      quantity: DataTypes.TEXT,
      number: DataTypes.INTEGER,
      why: DataTypes.TEXT,
      createdBy: DataTypes.UUID,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'valueTable',
      tableName: 'value_table',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
  AdoptedValueRow.init(
    {
      tableId: { type: DataTypes.UUID, primaryKey: true },
      collaborationId: DataTypes.UUID,
      starId: { type: DataTypes.UUID, primaryKey: true },
      value: DataTypes.JSONB,
      source: DataTypes.TEXT,
    },
    {
      sequelize,
      modelName: 'adoptedValue',
      tableName: 'adopted_value',
      underscored: true,
      timestamps: false,
    },
  );
}
