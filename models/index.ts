import { AsyncLocalStorage } from 'node:async_hooks';
import { Sequelize, type Transaction } from 'sequelize';
import { config } from '@/lib/config';
import { AccessTokenRow, defineAccessToken } from './access-token';
import { AnalysisRow, defineAnalysis } from './analysis';
import { AuditEntryRow, defineAuditEntry } from './audit-entry';
import { CollaborationRow, defineCollaboration } from './collaboration';
import { ColumnMemoryRow, defineColumnMemory } from './column-memory';
import { CombinationRow, defineCombination } from './combination';
import { CompanionRow, defineCompanion } from './companion';
import { CompanionObservationRow, defineCompanionObservation } from './companion-observation';
import { CompanionVerdictRow, defineCompanionVerdict } from './companion-verdict';
import { CompletenessMapRow, defineCompletenessMap } from './completeness-map';
import { ContrastCurveRow, defineContrastCurve } from './contrast-curve';
import { CoolingTableRow, defineCoolingTable } from './cooling-table';
import { CollaborationExportRow, DepartureRow, defineDeparture } from './departure';
import { DepositRow, defineDeposit } from './deposit';
import { defineExercise, ExerciseRow } from './exercise';
import { defineExerciseStart, ExerciseStartRow } from './exercise-start';
import { defineExerciseSubmission, ExerciseSubmissionRow } from './exercise-submission';
import { BundleImportRow, defineFrozenRun, FrozenRunRow } from './frozen-run';
import { defineGuestLink, GuestLinkRow, GuestNoteRow } from './guest-link';
import { defineInvitation, InvitationRow } from './invitation';
import { defineJob, JobRow } from './job';
import { defineMember, MemberRow } from './member';
import { defineNote, NoteRow } from './note';
import { defineOutgoingMessage, OutgoingMessageRow } from './outgoing-message';
import { definePerson, PersonRow } from './person';
import { definePopulation, PopulationRow } from './population';
import { defineRelease, ReleaseFileRow, ReleaseRow, ReleaseRunRow } from './release';
import { defineRun, RunRow } from './run';
import { defineSample, SampleRow } from './sample';
import { defineSession, SessionRow } from './session';
import { defineShare, ShareRow } from './share';
import { defineStar, StarRow } from './star';
import { defineStarMatch, StarMatchRow } from './star-match';
import { defineStudy, StudyRow } from './study';
import { defineSurvey, SurveyRow } from './survey';
import { defineTarget, TargetRow } from './target';
import { defineUpload, UploadRow } from './upload';
import { defineUploadChange, UploadChangeRow } from './upload-change';
import { AdoptedValueRow, defineValueTable, ValueTableRow } from './value-table';

export {
  AccessTokenRow,
  AdoptedValueRow,
  AnalysisRow,
  AuditEntryRow,
  BundleImportRow,
  CollaborationExportRow,
  CollaborationRow,
  ColumnMemoryRow,
  CombinationRow,
  CompanionObservationRow,
  CompanionRow,
  CompanionVerdictRow,
  CompletenessMapRow,
  ContrastCurveRow,
  CoolingTableRow,
  DepartureRow,
  DepositRow,
  ExerciseRow,
  ExerciseStartRow,
  ExerciseSubmissionRow,
  FrozenRunRow,
  GuestLinkRow,
  GuestNoteRow,
  InvitationRow,
  JobRow,
  MemberRow,
  NoteRow,
  OutgoingMessageRow,
  PersonRow,
  PopulationRow,
  ReleaseFileRow,
  ReleaseRow,
  ReleaseRunRow,
  RunRow,
  SampleRow,
  SessionRow,
  ShareRow,
  StarMatchRow,
  StarRow,
  StudyRow,
  SurveyRow,
  TargetRow,
  UploadChangeRow,
  UploadRow,
  ValueTableRow,
};

/** All associations stand here, so that no model imports another. Each names its alias and column. */
function associate(): void {
  MemberRow.belongsTo(PersonRow, { as: 'person', foreignKey: 'personId' });
  MemberRow.belongsTo(CollaborationRow, { as: 'collaboration', foreignKey: 'collaborationId' });
  SessionRow.belongsTo(PersonRow, { as: 'person', foreignKey: 'personId' });
  InvitationRow.belongsTo(CollaborationRow, { as: 'collaboration', foreignKey: 'collaborationId' });
  SurveyRow.belongsTo(PersonRow, { as: 'lead', foreignKey: 'leadId' });
  SurveyRow.hasMany(TargetRow, { as: 'targets', foreignKey: 'surveyId' });
  TargetRow.belongsTo(SurveyRow, { as: 'survey', foreignKey: 'surveyId' });
  TargetRow.belongsTo(StarRow, { as: 'star', foreignKey: 'starId' });
  StarRow.hasMany(TargetRow, { as: 'targets', foreignKey: 'starId' });
  TargetRow.hasMany(ContrastCurveRow, { as: 'curves', foreignKey: 'targetId' });
  TargetRow.hasMany(CompanionRow, { as: 'companions', foreignKey: 'targetId' });
  CompanionRow.belongsTo(TargetRow, { as: 'target', foreignKey: 'targetId' });
  CompanionRow.hasMany(CompanionObservationRow, { as: 'observations', foreignKey: 'companionId' });
  CompanionRow.hasMany(CompanionVerdictRow, { as: 'verdicts', foreignKey: 'companionId' });
  TargetRow.belongsTo(CompletenessMapRow, { as: 'map', foreignKey: 'mapId' });
  AnalysisRow.hasMany(RunRow, { as: 'runs', foreignKey: 'analysisId' });
  AnalysisRow.belongsTo(AnalysisRow, { as: 'parent', foreignKey: 'parentId' });
  RunRow.belongsTo(AnalysisRow, { as: 'analysis', foreignKey: 'analysisId' });
  RunRow.belongsTo(JobRow, { as: 'job', foreignKey: 'jobId' });
  RunRow.hasMany(StudyRow, { as: 'studies', foreignKey: 'runId' });
  StudyRow.belongsTo(RunRow, { as: 'run', foreignKey: 'runId' });
  StudyRow.belongsTo(JobRow, { as: 'job', foreignKey: 'jobId' });
  AuditEntryRow.belongsTo(PersonRow, { as: 'person', foreignKey: 'personId' });
}

function defineModels(sequelize: Sequelize): void {
  defineCollaboration(sequelize);
  definePerson(sequelize);
  defineSession(sequelize);
  defineMember(sequelize);
  defineInvitation(sequelize);
  defineAccessToken(sequelize);
  defineShare(sequelize);
  defineSurvey(sequelize);
  defineUpload(sequelize);
  defineUploadChange(sequelize);
  defineColumnMemory(sequelize);
  defineStar(sequelize);
  defineStarMatch(sequelize);
  defineValueTable(sequelize);
  defineTarget(sequelize);
  defineContrastCurve(sequelize);
  defineCoolingTable(sequelize);
  defineCompletenessMap(sequelize);
  defineCompanion(sequelize);
  defineCompanionObservation(sequelize);
  defineCompanionVerdict(sequelize);
  definePopulation(sequelize);
  defineAnalysis(sequelize);
  defineJob(sequelize);
  defineSample(sequelize);
  defineCombination(sequelize);
  defineRun(sequelize);
  defineStudy(sequelize);
  defineExercise(sequelize);
  defineExerciseStart(sequelize);
  defineExerciseSubmission(sequelize);
  defineFrozenRun(sequelize);
  defineRelease(sequelize);
  defineDeposit(sequelize);
  defineDeparture(sequelize);
  defineGuestLink(sequelize);
  defineNote(sequelize);
  defineOutgoingMessage(sequelize);
  defineAuditEntry(sequelize);
  associate();
}

/** Longer than any page or answer takes; what ends here was asked too much, or waits for a lock. */
const WEB_STATEMENT_MS = 30_000;

function open(databaseUrl: string, poolSize: number): Sequelize {
  joinWholeRequest(Sequelize);
  const sequelize = new Sequelize(databaseUrl, {
    dialect: 'postgres',
    logging: false,
    pool: { max: poolSize, min: 0, idle: 5_000 },
    dialectOptions: {
      idle_in_transaction_session_timeout: 60_000,
      statement_timeout: holder.rareboundTakesItsTime ? 0 : WEB_STATEMENT_MS,
    },
  });
  askInTurn(sequelize);
  return sequelize;
}

/** A worker's statements end by themselves, however long they take; to be said before the first. */
export function takeTime(): void {
  holder.rareboundTakesItsTime = true;
}

/** A transaction has one connection, which answers one statement at a time: the next one waits here. */
function askInTurn(sequelize: Sequelize): void {
  const ask = sequelize.query.bind(sequelize) as (
    sql: unknown,
    options?: { transaction?: Transaction | null },
  ) => Promise<unknown>;
  const last = new WeakMap<Transaction, Promise<unknown>>();
  const inTurn: typeof ask = (sql, options) => {
    const { transaction = wholeRequest().getStore() } = options ?? {};
    if (!transaction) return ask(sql, options);
    const before = last.get(transaction);
    const answer = before ? before.then(() => ask(sql, options)) : ask(sql, options);
    last.set(
      transaction,
      answer.catch(() => undefined),
    );
    return answer;
  };
  sequelize.query = inTurn as typeof sequelize.query;
}

const holder = globalThis as typeof globalThis & {
  rareboundDatabase?: Sequelize;
  rareboundTransaction?: AsyncLocalStorage<Transaction>;
  rareboundTakesItsTime?: boolean;
};

/** The transaction that a request as a whole runs in, where it has one. */
function wholeRequest(): AsyncLocalStorage<Transaction> {
  holder.rareboundTransaction ??= new AsyncLocalStorage<Transaction>();
  return holder.rareboundTransaction;
}

/** Lets a statement that names no transaction join that of its request; nothing else sets one. */
function joinWholeRequest({ useCLS: takeContext }: Pick<typeof Sequelize, 'useCLS'>): void {
  takeContext({
    get: (key: string) => (key === 'transaction' ? wholeRequest().getStore() : undefined),
    set: () => undefined,
    bind: <F>(work: F) => work,
    run: (work: (context: object) => unknown) => work({}),
  });
}

/** The connection on which this copy of the module has defined its models. */
let definedOn: Sequelize | undefined;

/**
 * The process's one connection, opened at first use: importing a module never connects.
 *
 * The web build holds several copies of this module, for pages and for handlers; they share the
 * pool, and each defines its own classes on it.
 */
export function database(): Sequelize {
  holder.rareboundDatabase ??= open(config().databaseUrl, config().databasePool);
  if (definedOn !== holder.rareboundDatabase) {
    definedOn = holder.rareboundDatabase;
    defineModels(definedOn);
  }
  return holder.rareboundDatabase;
}

/** Closes the process's connection; the next use opens a new one. */
export async function closeDatabase(): Promise<void> {
  await holder.rareboundDatabase?.close();
  holder.rareboundDatabase = undefined;
}

/** Whether what is asked now belongs to the transaction of a whole request. */
export const isInOneTransaction = (): boolean => wholeRequest().getStore() !== undefined;

/** One transaction per use case; within `inOneTransaction` it is the one that is open. */
export function inTransaction<T>(work: (transaction: Transaction) => Promise<T>): Promise<T> {
  const open = wholeRequest().getStore();
  return open ? work(open) : database().transaction(work);
}

/** Everything that the work reads and writes, on one connection, all or nothing. */
export function inOneTransaction<T>(work: (transaction: Transaction) => Promise<T>): Promise<T> {
  const storage = wholeRequest();
  return database().transaction((transaction) => storage.run(transaction, () => work(transaction)));
}
