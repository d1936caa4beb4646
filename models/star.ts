import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A physical star; the targets of several surveys may be the same star. */
export class StarRow extends Model<InferAttributes<StarRow>, InferCreationAttributes<StarRow>> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare name: string;
  declare foldedName: string;
  declare gaiaDr3Id: CreationOptional<string | null>;
  /** The star that this one was found to be; its targets are listed there. */
  declare mergedInto: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineStar(sequelize: Sequelize): void {
  StarRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      name: DataTypes.TEXT,
      foldedName: DataTypes.TEXT,
      gaiaDr3Id: DataTypes.TEXT,
      mergedInto: DataTypes.UUID,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'star',
      tableName: 'star',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
