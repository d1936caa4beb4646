import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** Somebody who signs in. The e-mail address is stored in lower case. */
export class PersonRow extends Model<
  InferAttributes<PersonRow>,
  InferCreationAttributes<PersonRow>
> {
  declare id: CreationOptional<string>;
  declare email: string;
  declare name: string;
  declare passwordHash: string;
  declare orcid: CreationOptional<string | null>;
  declare suspendedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function definePerson(sequelize: Sequelize): void {
  PersonRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      email: DataTypes.TEXT,
      name: DataTypes.TEXT,
      passwordHash: DataTypes.TEXT,
      orcid: DataTypes.TEXT,
      suspendedAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'person',
      tableName: 'person',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
