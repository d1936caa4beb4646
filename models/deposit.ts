import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

/** The copy of a release in an open repository, as far as it has got. */
export class DepositRow extends Model<
  InferAttributes<DepositRow>,
  InferCreationAttributes<DepositRow>
> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare releaseId: string;
  declare jobId: string;
  /** What the repository calls it. */
  declare remoteId: CreationOptional<string | null>;
  declare doi: CreationOptional<string | null>;
  /** Its page at the repository. */
  declare address: CreationOptional<string | null>;
  /** Names of files that arrived whole. */
  declare uploaded: CreationOptional<string[]>;
  declare askedBy: CreationOptional<string | null>;
  declare askedByName: string;
  declare createdAt: CreationOptional<Date>;
  declare publishedAt: CreationOptional<Date | null>;
}

export function defineDeposit(sequelize: Sequelize): void {
  DepositRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      releaseId: DataTypes.UUID,
      jobId: DataTypes.UUID,
      remoteId: DataTypes.TEXT,
      doi: DataTypes.TEXT,
      address: DataTypes.TEXT,
      uploaded: DataTypes.JSONB,
      askedBy: DataTypes.UUID,
      askedByName: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      publishedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'deposit',
      tableName: 'deposit',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
