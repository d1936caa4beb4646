import { z } from 'zod';
import { sessionSchema } from '@/lib/schemas/account';
import { newKeySchema, recoveryCodesSchema } from '@/lib/schemas/account-access';
import { activityPageSchema } from '@/lib/schemas/activity';
import { analysisSchema } from '@/lib/schemas/analyses';
import { bundleImportSchema } from '@/lib/schemas/bundles';
import { candidateDetailSchema, candidateListSchema } from '@/lib/schemas/candidates';
import { combinationPreviewSchema, combinationSchema } from '@/lib/schemas/combinations';
import { coolingRelationSchema } from '@/lib/schemas/cooling';
import { depositSchema } from '@/lib/schemas/deposits';
import { exerciseDetailSchema, exerciseSchema, submissionSchema } from '@/lib/schemas/exercises';
import { exportListSchema } from '@/lib/schemas/exports';
import { helpDefinitionSchema } from '@/lib/schemas/help';
import { jobSchema } from '@/lib/schemas/jobs';
import { leavingSchema } from '@/lib/schemas/leaving';
import { failedMessagesSchema, mailPreferencesSchema, stoppedMailSchema } from '@/lib/schemas/mail';
import { mapStoreSchema, surveyMapsSchema } from '@/lib/schemas/map-states';
import { noteListSchema, oneNoteSchema } from '@/lib/schemas/notes';
import { overviewSchema } from '@/lib/schemas/overview';
import {
  invitationOfferSchema,
  invitationSchema,
  memberSchema,
  meSchema,
  newTokenSchema,
  tokenSchema,
} from '@/lib/schemas/people';
import { populationListSchema } from '@/lib/schemas/population-versions';
import { populationSchema } from '@/lib/schemas/populations';
import {
  freezeStandingSchema,
  guestLinkSchema,
  guestNoteSchema,
  newGuestLinkSchema,
  releaseSchema,
} from '@/lib/schemas/releases';
import { runSchema, runSummarySchema } from '@/lib/schemas/runs';
import { samplePreviewSchema, sampleSchema } from '@/lib/schemas/samples';
import { searchAnswerSchema } from '@/lib/schemas/search';
import { mapViewSchema } from '@/lib/schemas/sensitivity';
import { settingsSchema } from '@/lib/schemas/settings';
import { shareSchema, sharesSchema } from '@/lib/schemas/sharing';
import {
  adoptionPreviewSchema,
  overlapsSchema,
  proposedSchema,
  starListSchema,
  starPageSchema,
  valueTablesSchema,
} from '@/lib/schemas/stars';
import { studySchema, studySummarySchema } from '@/lib/schemas/studies';
import {
  companionSchema,
  coolingTableSchema,
  surveyListSchema,
  surveySchema,
  targetListSchema,
  targetSchema,
} from '@/lib/schemas/surveys';
import { dependentsSchema, uploadSchema } from '@/lib/schemas/uploads';
import { workSchema } from '@/lib/schemas/work';

export {
  activityPageSchema,
  adoptionPreviewSchema,
  analysisSchema,
  bundleImportSchema,
  candidateDetailSchema,
  candidateListSchema,
  combinationPreviewSchema,
  combinationSchema,
  companionSchema,
  coolingRelationSchema,
  coolingTableSchema,
  dependentsSchema,
  depositSchema,
  exerciseDetailSchema,
  exerciseSchema,
  exportListSchema,
  failedMessagesSchema,
  freezeStandingSchema,
  guestLinkSchema,
  guestNoteSchema,
  helpDefinitionSchema,
  invitationOfferSchema,
  invitationSchema,
  jobSchema,
  leavingSchema,
  mailPreferencesSchema,
  mapStoreSchema,
  mapViewSchema,
  memberSchema,
  meSchema,
  newGuestLinkSchema,
  newKeySchema,
  newTokenSchema,
  noteListSchema,
  oneNoteSchema,
  overlapsSchema,
  overviewSchema,
  populationListSchema,
  populationSchema,
  proposedSchema,
  recoveryCodesSchema,
  releaseSchema,
  runSchema,
  runSummarySchema,
  samplePreviewSchema,
  sampleSchema,
  searchAnswerSchema,
  sessionSchema,
  settingsSchema,
  shareSchema,
  sharesSchema,
  starListSchema,
  starPageSchema,
  stoppedMailSchema,
  studySchema,
  studySummarySchema,
  submissionSchema,
  surveyListSchema,
  surveyMapsSchema,
  surveySchema,
  targetListSchema,
  targetSchema,
  tokenSchema,
  uploadSchema,
  valueTablesSchema,
  workSchema,
};

export const analysisAnswerSchema = z.object({ analysis: z.string() });
export const analysisListSchema = z.object({ analyses: z.array(analysisSchema) });
export const anyAnswerSchema = z.unknown();
export const collaborationAnswerSchema = z.object({ collaboration: z.string() });
export const combinationsAnswerSchema = z.object({ combinations: z.array(combinationSchema) });
export const companionsAnswerSchema = z.object({ companions: z.array(companionSchema) });
export const coolingTablesAnswerSchema = z.object({ coolingTables: z.array(coolingTableSchema) });
export const exercisesAnswerSchema = z.object({ exercises: z.array(exerciseSchema) });
export const importsAnswerSchema = z.object({ imports: z.array(bundleImportSchema) });
export const invitationsSchema = z.object({ invitations: z.array(invitationSchema) });
export const jobsSchema = z.object({ jobs: z.array(jobSchema) });
export const linksAnswerSchema = z.object({ links: z.array(guestLinkSchema) });
export const membersSchema = z.object({ members: z.array(memberSchema) });
export const runListSchema = z.object({ runs: z.array(runSummarySchema) });
export const samplesAnswerSchema = z.object({ samples: z.array(sampleSchema) });
export const sessionsSchema = z.object({ sessions: z.array(sessionSchema) });
export const slugAnswerSchema = z.object({ slug: z.string() });
export const studyListSchema = z.object({ studies: z.array(studySummarySchema) });
export const tokensSchema = z.object({ tokens: z.array(tokenSchema) });
export const uploadsAnswerSchema = z.object({ uploads: z.array(uploadSchema) });
