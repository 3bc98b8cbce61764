import * as z from 'zod/mini';
import { identifier, NAME_MAXIMUM_CHARACTERS, note, oneLine, supplyVolts } from './fields.ts';

export const SESSION_PURPOSES = [
  'speed-check',
  'voltage-sweep',
  'coast-down',
  'run-time',
  'load',
  'batch',
  'class',
] as const;
export type SessionPurpose = (typeof SESSION_PURPOSES)[number];

const AMBIENT_MINIMUM_CELSIUS = -60;
const AMBIENT_MAXIMUM_CELSIUS = 120;
const AMBIENT_MESSAGE = `Must be a number from ${String(AMBIENT_MINIMUM_CELSIUS)} to ${String(AMBIENT_MAXIMUM_CELSIUS)} °C.`;
const ambientCelsius = z
  .number(AMBIENT_MESSAGE)
  .check(z.gte(AMBIENT_MINIMUM_CELSIUS, AMBIENT_MESSAGE), z.lte(AMBIENT_MAXIMUM_CELSIUS, AMBIENT_MESSAGE));

/** Conditions that hold for every recording of the session. */
export const sessionConditions = z.strictObject({
  supplyVolts: z._default(z.nullable(supplyVolts), null),
  load: z._default(z.nullable(oneLine(NAME_MAXIMUM_CHARACTERS)), null),
  ambientCelsius: z._default(z.nullable(ambientCelsius), null),
  note: z._default(z.nullable(note), null),
});
export type SessionConditions = z.infer<typeof sessionConditions>;

const sessionFields = {
  title: oneLine(NAME_MAXIMUM_CHARACTERS),
  purpose: z.enum(SESSION_PURPOSES, `Must be one of ${SESSION_PURPOSES.join(', ')}.`),
  buildId: z.optional(z.nullable(identifier)),
  conditions: z.optional(sessionConditions),
};

export const createSessionRequest = z.strictObject({ benchId: z.optional(identifier), ...sessionFields });
export type CreateSessionRequest = z.infer<typeof createSessionRequest>;
export const updateSessionRequest = z.partial(z.strictObject(sessionFields));
export type UpdateSessionRequest = z.infer<typeof updateSessionRequest>;

export const sessionView = z.object({
  id: z.uuid(),
  benchId: z.uuid(),
  title: z.string(),
  purpose: z.enum(SESSION_PURPOSES),
  build: z.nullable(z.object({ id: z.uuid(), name: z.string(), revision: z.int() })),
  conditions: sessionConditions,
  recordingCount: z.int(),
  needsPersonCount: z.int(),
  createdBy: z.object({ id: z.uuid(), name: z.string() }),
  createdAt: z.string(),
  updatedAt: z.string(),
  abilities: z.object({ canEdit: z.boolean(), canAddRecording: z.boolean() }),
});
export type SessionView = z.infer<typeof sessionView>;

const interval = z.object({ value: z.number(), low: z.number(), high: z.number(), unit: z.string() });

/** What the session's recordings say together; every figure with its 95 % interval and unit. */
export const sessionResultView = z.object({
  sessionId: z.uuid(),
  purpose: z.enum(SESSION_PURPOSES),
  /** The result in one sentence. */
  sentence: z.string(),
  /** What is still missing for a verdict, in words; empty when nothing is. */
  missing: z.array(z.string()),
  measuredCount: z.int(),
  /** One point a measured recording, oldest first. */
  points: z.array(
    z.object({
      recordingId: z.uuid(),
      recordedAt: z.string(),
      buildName: z.nullable(z.string()),
      supplyVolts: z.nullable(z.number()),
      rpm: z.number(),
      rpmLow: z.number(),
      rpmHigh: z.number(),
      confidence: z.number(),
      reviewed: z.boolean(),
    }),
  ),
  /** Named figures: meanSpeed, speedSpread, repeatability; for a sweep speedConstant and noLoadOffset. */
  figures: z.record(z.string(), interval),
});
export type SessionResultView = z.infer<typeof sessionResultView>;
