import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A candidate or companion of a target, with its vetting. */
export class CompanionRow extends Model<
  InferAttributes<CompanionRow>,
  InferCreationAttributes<CompanionRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare targetId: string;
  declare uploadId: CreationOptional<string | null>;
  declare name: string;
  declare foldedName: string;
  declare status: 'confirmed' | 'candidate' | 'ambiguous' | 'background';
  declare massMjup: CreationOptional<number | null>;
  declare massErrorLowerMjup: CreationOptional<number | null>;
  declare massErrorUpperMjup: CreationOptional<number | null>;
  declare semiMajorAxisAu: CreationOptional<number | null>;
  declare semiMajorAxisErrorLowerAu: CreationOptional<number | null>;
  declare semiMajorAxisErrorUpperAu: CreationOptional<number | null>;
  declare probability: CreationOptional<number | null>;
  declare attributes: CreationOptional<Record<string, unknown>>;
  declare reference: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineCompanion(sequelize: Sequelize): void {
  CompanionRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      targetId: DataTypes.UUID,
      uploadId: DataTypes.UUID,
      name: DataTypes.TEXT,
      foldedName: DataTypes.TEXT,
      status: DataTypes.TEXT,
      massMjup: DataTypes.DOUBLE,
      massErrorLowerMjup: DataTypes.DOUBLE,
      massErrorUpperMjup: DataTypes.DOUBLE,
      semiMajorAxisAu: DataTypes.DOUBLE,
      semiMajorAxisErrorLowerAu: DataTypes.DOUBLE,
      semiMajorAxisErrorUpperAu: DataTypes.DOUBLE,
      probability: DataTypes.DOUBLE,
      attributes: DataTypes.JSONB,
      reference: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'companion',
      tableName: 'companion',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
