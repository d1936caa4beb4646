import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';

export type JobStatus = 'waiting' | 'running' | 'done' | 'failed' | 'cancelled';

/** Work on the queue: its state, its progress, and the token of the attempt that holds it. */
export class JobRow extends Model<InferAttributes<JobRow>, InferCreationAttributes<JobRow>> {
  declare id: CreationOptional<string>;
  declare collaborationId: string;
  declare kind:
    | 'compute-maps'
    | 'compute-run'
    | 'compute-study'
    | 'verify-release'
    | 'recreate-run'
    | 'deposit-release'
    | 'export-collaboration';
  declare surveyId: CreationOptional<string | null>;
  declare status: CreationOptional<JobStatus>;
  declare payload: CreationOptional<Record<string, unknown>>;
  declare attemptToken: CreationOptional<string | null>;
  declare attempts: CreationOptional<number>;
  declare workerId: CreationOptional<string | null>;
  declare leaseUntil: CreationOptional<Date | null>;
  declare stage: CreationOptional<string>;
  declare doneCount: CreationOptional<number>;
  declare totalCount: CreationOptional<number>;
  declare cancelRequestedAt: CreationOptional<Date | null>;
  declare fault: CreationOptional<string | null>;
  declare requestedBy: CreationOptional<string | null>;
  declare requestId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare startedAt: CreationOptional<Date | null>;
  declare finishedAt: CreationOptional<Date | null>;
}

export function defineJob(sequelize: Sequelize): void {
  JobRow.init(
    {
      id: { type: DataTypes.UUID, defaultValue: DataTypes.UUIDV4, primaryKey: true },
      collaborationId: DataTypes.UUID,
      kind: DataTypes.TEXT,
      surveyId: DataTypes.UUID,
      status: DataTypes.TEXT,
      payload: DataTypes.JSONB,
      attemptToken: DataTypes.UUID,
      attempts: DataTypes.INTEGER,
      workerId: DataTypes.TEXT,
      leaseUntil: DataTypes.DATE,
      stage: DataTypes.TEXT,
      doneCount: DataTypes.INTEGER,
      totalCount: DataTypes.INTEGER,
      cancelRequestedAt: DataTypes.DATE,
      fault: DataTypes.TEXT,
      requestedBy: DataTypes.UUID,
      requestId: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
      startedAt: DataTypes.DATE,
      finishedAt: DataTypes.DATE,
    },
    {
      sequelize,
      modelName: 'job',
      tableName: 'job',
      underscored: true,
      timestamps: true,
      updatedAt: false,
    },
  );
}
