import type * as z from 'zod/mini';
import { listOfBenchQuery, listRecordingsQuery } from '#lib/schemas/queries.ts';
import type { Call } from '#server/policies/policyTable.ts';
import type { ComponentName } from './components.ts';

export const API_BASE_PATH = '/api/v1';

/** A call of the API; the compiler asks for a description of each. */
export type ApiCall = Extract<Call, `${string} ${typeof API_BASE_PATH}/${string}`>;

/** An answer: a schema, another content type, or nothing in it. */
type Answer = ComponentName | { readonly contentType: string; readonly description: string } | null;

export interface CallDescription {
  readonly summary: string;
  readonly query?: z.ZodMiniType;
  readonly body?: ComponentName | 'multipart';
  readonly answers: Readonly<Record<number, Answer>>;
}

const SOUND_FILE = 'The bytes; a part of them with a Range header.';

export const CALLS: Readonly<Record<ApiCall, CallDescription>> = {
  'GET /api/v1/openapi.json': {
    summary: 'This document',
    answers: { 200: { contentType: 'application/json', description: 'OpenAPI 3.1' } },
  },
  'POST /api/v1/sign-in': {
    summary: 'Sign in with a password; sets the cookie',
    body: 'SignIn',
    answers: { 204: null },
  },
  'POST /api/v1/sign-out': { summary: 'End the sign-in of the cookie', answers: { 204: null } },
  'GET /api/v1/me': { summary: 'Account, benches and roles', answers: { 200: 'Me' } },

  'GET /api/v1/builds': { summary: 'Builds, newest first', query: listOfBenchQuery, answers: { 200: 'Builds' } },
  'POST /api/v1/builds': {
    summary: 'Add a build; without eventsPerTurn it follows from the geometry',
    body: 'CreateBuild',
    answers: { 201: 'Build' },
  },
  'GET /api/v1/builds/[id]': { summary: 'One build', answers: { 200: 'Build' } },
  'PATCH /api/v1/builds/[id]': {
    summary: 'Change what is named; another geometry raises the revision',
    body: 'UpdateBuild',
    answers: { 200: 'Build' },
  },

  'GET /api/v1/sessions': { summary: 'Sessions, newest first', query: listOfBenchQuery, answers: { 200: 'Sessions' } },
  'POST /api/v1/sessions': { summary: 'Begin a session', body: 'CreateSession', answers: { 201: 'Session' } },
  'GET /api/v1/sessions/[id]': { summary: 'One session', answers: { 200: 'Session' } },
  'PATCH /api/v1/sessions/[id]': {
    summary: 'Change what is named; conditions are replaced as a whole',
    body: 'UpdateSession',
    answers: { 200: 'Session' },
  },
  'GET /api/v1/sessions/[id]/result': {
    summary: 'What the recordings say together, with units and 95 % intervals',
    answers: { 200: 'SessionResult' },
  },

  'GET /api/v1/recordings': {
    summary: 'Recordings, newest first',
    query: listRecordingsQuery,
    answers: { 200: 'Recordings' },
  },
  'POST /api/v1/recordings': {
    summary: 'Upload one recording; answered once file and row are safe. 200: the key was used for it before',
    body: 'multipart',
    answers: { 200: 'Upload', 201: 'Upload' },
  },
  'GET /api/v1/recordings/[id]': { summary: 'One recording with its current reading', answers: { 200: 'Recording' } },
  'PATCH /api/v1/recordings/[id]': {
    summary: 'Change its conditions',
    body: 'UpdateRecording',
    answers: { 200: 'Recording' },
  },
  'GET /api/v1/recordings/[id]/readings': { summary: 'All its readings, newest first', answers: { 200: 'Readings' } },
  'POST /api/v1/recordings/[id]/readings': {
    summary: 'Analyse again with other settings',
    body: 'AnalyseAgain',
    answers: { 202: 'Recording' },
  },
  'GET /api/v1/recordings/[id]/playback': {
    summary: 'Sound made for playing',
    answers: { 200: { contentType: 'audio/*', description: SOUND_FILE } },
  },
  'GET /api/v1/recordings/[id]/original': {
    summary: 'The file as it was uploaded, to save',
    answers: { 200: { contentType: 'application/octet-stream', description: SOUND_FILE } },
  },
  'POST /api/v1/readings/[id]/reviews': {
    summary: 'A person confirms a reading, chooses another speed, or discards it',
    body: 'CreateReview',
    answers: { 201: 'Review' },
  },
  'GET /api/v1/readings/[id]/series/[name]': {
    summary: 'Columns of numbers with their units',
    answers: { 200: 'Series' },
  },
  'GET /api/v1/updates': {
    summary: 'Server-sent events (event: change, data: Update) of the benches that the caller may read',
    answers: { 200: { contentType: 'text/event-stream', description: 'One Update as JSON an event' } },
  },
};
