import {
  OpenAPIRegistry,
  OpenApiGeneratorV31,
  type RouteConfig,
  zodToOpenAPIRegistry,
} from '@asteasolutions/zod-to-openapi';
import { type ZodType, z } from 'zod';
import { collaborationSchema, sessionSchema } from './account';
import { activityEntrySchema } from './activity';
import { analysisRecipeSchema, analysisSchema } from './analyses';
import { type ApiRoute, apiRoutes } from './api-routes';
import { auditEntrySchema } from './audit';
import { candidateDetailSchema, candidateSchema } from './candidates';
import { jobSchema } from './jobs';
import { noteSchema } from './notes';
import { answerHeadersOf, refusalHeaders, requestHeadersOf } from './openapi-headers';
import { invitationSchema, memberSchema, meSchema, tokenSchema } from './people';
import {
  listedPopulationSchema,
  populationDefinitionSchema,
  populationSchema,
} from './populations';
import { faultSchema, problemSchema } from './problem';
import { runInputsSchema, runResultSchema, runSummarySchema } from './runs';
import { mapSettingsSchema, mapViewSchema } from './sensitivity';
import { settingsSchema } from './settings';
import { studySchema, studySummarySchema } from './studies';
import { studyResultSchema } from './study-results';
import { studySettingsSchema } from './study-settings';
import {
  companionSchema,
  coolingTableSchema,
  curveSchema,
  surveySchema,
  targetSchema,
} from './surveys';
import { uploadReportSchema, uploadSchema } from './uploads';

/** Shapes that a reader looks up by name; all others stand where they are used. */
const named: Record<string, ZodType> = {
  Activity: activityEntrySchema,
  Analysis: analysisSchema,
  AnalysisRecipe: analysisRecipeSchema,
  AuditEntry: auditEntrySchema,
  Candidate: candidateSchema,
  CandidateDetail: candidateDetailSchema,
  Collaboration: collaborationSchema,
  Companion: companionSchema,
  ContrastCurve: curveSchema,
  CoolingTable: coolingTableSchema,
  CompletenessMap: mapViewSchema,
  Fault: faultSchema,
  Invitation: invitationSchema,
  Job: jobSchema,
  MapSettings: mapSettingsSchema,
  Me: meSchema,
  Member: memberSchema,
  Note: noteSchema,
  ListedPopulation: listedPopulationSchema,
  Population: populationSchema,
  PopulationDefinition: populationDefinitionSchema,
  Problem: problemSchema,
  RunInputs: runInputsSchema,
  RunResult: runResultSchema,
  RunSummary: runSummarySchema,
  Session: sessionSchema,
  Settings: settingsSchema,
  Study: studySchema,
  StudyResult: studyResultSchema,
  StudySettings: studySettingsSchema,
  StudySummary: studySummarySchema,
  Survey: surveySchema,
  Target: targetSchema,
  Token: tokenSchema,
  Upload: uploadSchema,
  UploadReport: uploadReportSchema,
};

/** The schemas stand in modules that are loaded before this one: they are named here, not there. */
function nameSchemas(): void {
  for (const [refId, schema] of Object.entries(named)) {
    if (!zodToOpenAPIRegistry.has(schema))
      zodToOpenAPIRegistry.add(schema, { _internal: { refId } });
  }
}

const PROBLEM = {
  description: 'Refused: a problem document after RFC 9457 with the place of each fault',
  headers: refusalHeaders,
  content: { 'application/problem+json': { schema: problemSchema } },
};

const FILE = { type: 'string' as const, format: 'binary' };

const security: Record<ApiRoute['access'], Record<string, string[]>[]> = {
  open: [{}],
  session: [{ session: [] }],
  read: [{ token: ['read'] }, { session: [] }],
  write: [{ token: ['write'] }, { session: [] }],
  run: [{ token: ['run'] }, { session: [] }],
};

function parametersOf(path: string) {
  const names = [...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
  if (names.length === 0) return undefined;
  return z.object(Object.fromEntries(names.map((name) => [name, z.string()])));
}

function responsesOf(one: ApiRoute): RouteConfig['responses'] {
  const { answer, files, status } = one;
  const headers = answerHeadersOf(one);
  if (!answer && !files) {
    return { 204: { description: 'Done; nothing to tell', headers }, default: PROBLEM };
  }
  const json = answer ? { 'application/json': { schema: answer } } : {};
  const others = (files ?? []).map((type) => [type, { schema: FILE }]);
  const content = { ...json, ...Object.fromEntries(others) };
  return { [status ?? 200]: { description: 'Done', headers, content }, default: PROBLEM };
}

function bodyOf({ body, isUpload, uploadType = 'application/octet-stream' }: ApiRoute) {
  if (isUpload) {
    return { required: true, content: { [uploadType]: { schema: FILE } } };
  }
  return body && { required: true, content: { 'application/json': { schema: body } } };
}

/** "get /collaborations/{collaboration}/surveys/{survey}" → "getTeamSurveysBySurvey". */
function operationIdOf({ method, path }: ApiRoute): string {
  const words = path
    .replace('/api/v1/', '')
    .replace('collaborations/{collaboration}', 'team')
    .split('/')
    .map((part) => part.replace(/^\{(\w+)\}$/, 'by-$1'));
  return [method, ...words].join('-').replace(/[-.](\w)/g, (_, letter) => letter.toUpperCase());
}

/** The generator leaves the flags of a regular expression behind its pattern: JSON Schema has none. */
function withoutFlags(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(withoutFlags);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value).map(([key, member]) => [
      key,
      key === 'pattern' && typeof member === 'string'
        ? member.replace(/\/[a-z]+$/, '')
        : withoutFlags(member),
    ]),
  );
}

export type OpenApiDocument = ReturnType<OpenApiGeneratorV31['generateDocument']>;

/** The OpenAPI 3.1 description of /api/v1, from the schemas that the handlers read with. */
export function buildOpenApi(serverAddress: string): OpenApiDocument {
  nameSchemas();
  const registry = new OpenAPIRegistry();
  registry.registerComponent('securitySchemes', 'token', {
    type: 'http',
    scheme: 'bearer',
    description: 'An access token of one collaboration, with the scopes read, write or run',
  });
  registry.registerComponent('securitySchemes', 'session', {
    type: 'apiKey',
    in: 'cookie',
    name: 'rarebound.session',
    description: 'The cookie of a signed-in browser; writes need the Origin of this server',
  });
  for (const route of apiRoutes) {
    registry.registerPath({
      method: route.method,
      path: route.path,
      operationId: operationIdOf(route),
      summary: route.summary,
      security: security[route.access],
      request: {
        params: parametersOf(route.path),
        query: route.query,
        headers: requestHeadersOf(route, apiRoutes),
        body: bodyOf(route),
      },
      responses: responsesOf(route),
    });
  }
  const document = new OpenApiGeneratorV31(registry.definitions, {
    sortComponents: 'alphabetically',
  }).generateDocument({
    openapi: '3.1.0',
    info: {
      title: 'Rarebound',
      version: '1',
      description: 'Planet occurrence rates from direct-imaging surveys',
    },
    servers: [{ url: serverAddress }],
  });
  return withoutFlags(document) as OpenApiDocument;
}
