import * as z from 'zod/mini';
import { createBuildRequest, buildView, geometry, updateBuildRequest } from '#lib/schemas/build.ts';
import { meView, signInRequest } from '#lib/schemas/account.ts';
import { pageOf } from '#lib/schemas/page.ts';
import { problemBody } from '#lib/schemas/problem.ts';
import { analyseAgainRequest, readingView, reviewRequest, reviewView, seriesView } from '#lib/schemas/reading.ts';
import { recordingView, updateRecordingRequest, uploadResponse } from '#lib/schemas/recording.ts';
import {
  createSessionRequest,
  sessionConditions,
  sessionResultView,
  sessionView,
  updateSessionRequest,
} from '#lib/schemas/session.ts';
import { updateEvent } from '#lib/schemas/update.ts';

export type JsonSchema = Readonly<Record<string, unknown>>;

/** What a client sends, by its name in the document. */
const REQUESTS = {
  SignIn: signInRequest,
  CreateBuild: createBuildRequest,
  UpdateBuild: updateBuildRequest,
  CreateSession: createSessionRequest,
  UpdateSession: updateSessionRequest,
  UpdateRecording: updateRecordingRequest,
  AnalyseAgain: analyseAgainRequest,
  CreateReview: reviewRequest,
} as const;

/** What it gets back. */
const VIEWS = {
  Problem: problemBody,
  Me: meView,
  Geometry: geometry,
  Build: buildView,
  Builds: pageOf(buildView),
  SessionConditions: sessionConditions,
  Session: sessionView,
  Sessions: pageOf(sessionView),
  SessionResult: sessionResultView,
  Upload: uploadResponse,
  Reading: readingView,
  Readings: pageOf(readingView),
  Review: reviewView,
  Recording: recordingView,
  Recordings: pageOf(recordingView),
  Series: seriesView,
  Update: updateEvent,
} as const;

export type ComponentName = keyof typeof REQUESTS | keyof typeof VIEWS;

export const reference = (name: ComponentName) => ({ $ref: `#/components/schemas/${name}` });

/** The same schemas that judge requests and check answers, so that the document cannot say anything else. */
export function componentSchemas(): Record<string, JsonSchema> {
  return { ...jsonSchemas(REQUESTS, 'input'), ...jsonSchemas(VIEWS, 'output') };
}

function jsonSchemas(schemas: Readonly<Record<string, z.ZodMiniType>>, io: 'input' | 'output') {
  const registry = z.registry<{ id: string }>();
  for (const [id, schema] of Object.entries(schemas)) registry.add(schema, { id });
  const uri = (id: string) => `#/components/schemas/${id}`;
  // A view grows by fields: a client that refuses unknown ones would break with the first.
  const override = ({ jsonSchema: schema }: { jsonSchema: z.core.JSONSchema.BaseSchema }) => {
    if (io === 'output') delete schema.additionalProperties;
  };
  const { schemas: byName } = z.toJSONSchema(registry, { io, uri, override, unrepresentable: 'any' });
  return Object.fromEntries(Object.entries(byName).map(([name, schema]) => [name, withoutDialect(schema)]));
}

/** JSON Schema 2020-12, which OpenAPI 3.1 takes without saying so in every schema. */
export function jsonSchema(schema: z.ZodMiniType): JsonSchema {
  return withoutDialect(z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' }));
}

function withoutDialect(schema: JsonSchema): JsonSchema {
  return Object.fromEntries(Object.entries(schema).filter(([key]) => key !== '$schema' && key !== '$id'));
}
