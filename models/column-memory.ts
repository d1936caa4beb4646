import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** How the columns of a file with these headings were mapped when one was stored last. */
export class ColumnMemoryRow extends Model<
  InferAttributes<ColumnMemoryRow>,
  InferCreationAttributes<ColumnMemoryRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare surveyId: string;
  declare kind: string;
  declare headings: string[];
  declare headingsDigest: string;
  /** Heading → our column, or '' where it is left out. */
  declare columnMap: Record<string, string>;
  declare keptBy: CreationOptional<string | null>;
  declare keptAt: CreationOptional<Date>;
}

export function defineColumnMemory(sequelize: Sequelize): void {
  ColumnMemoryRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      surveyId: DataTypes.UUID,
      kind: DataTypes.TEXT,
      headings: DataTypes.ARRAY(DataTypes.TEXT),
      headingsDigest: DataTypes.TEXT,
      columnMap: DataTypes.JSONB,
      keptBy: DataTypes.UUID,
      keptAt: { type: DataTypes.DATE, defaultValue: DataTypes.NOW },
    },
    {
      sequelize,
      modelName: 'columnMemory',
      tableName: 'column_memory',
      underscored: true,
      timestamps: false,
    },
  );
}
