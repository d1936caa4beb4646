import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** A person in a collaboration, with one or several roles. */
export class MemberRow extends Model<
  InferAttributes<MemberRow>,
  InferCreationAttributes<MemberRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare personId: string;
  declare roles: string[];
  /** Their access rests since then; what they made stays. */
  declare suspendedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function defineMember(sequelize: Sequelize): void {
  MemberRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      personId: DataTypes.UUID,
      roles: DataTypes.ARRAY(DataTypes.TEXT),
      suspendedAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'member',
      tableName: 'member',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
