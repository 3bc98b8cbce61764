import { Readable } from 'node:stream';
import { AuditEntry } from '#server/models/AuditEntry.ts';
import { Build } from '#server/models/Build.ts';
import { Session } from '#server/models/Session.ts';
import type { Actor } from '#server/policies/actor.ts';
import { blobStorage } from '#server/storage/blobStorage.ts';
import { writeHashed } from '#server/storage/writeHashed.ts';
import { audit } from '#server/usecases/audit.ts';
import { createBuild } from '#server/usecases/createBuild.ts';
import { createRecording } from '#server/usecases/createRecording.ts';
import { createSession } from '#server/usecases/createSession.ts';
import type { DemoActors } from './demoAccounts.ts';
import { DEMO_BUILDS, DEMO_SESSIONS, type DemoRecording, type DemoSession } from './demoScenario.ts';

const SCENARIO_CREATED = 'demo.scenario-created';

/**
 * Fills the demo bench once, the way people do: builds and sessions by the lead, uploads by the member, all through
 * the use cases. A start that was cut half-way is completed by the next one; later changes by people stay.
 *
 * @returns how many recordings were uploaded
 */
export async function seedScenario({ lead, member }: DemoActors): Promise<number> {
  const benchId = lead.memberships[0]?.benchId ?? '';
  if (await AuditEntry.findOne({ where: { action: SCENARIO_CREATED, benchId } })) return 0;
  for (const request of DEMO_BUILDS) {
    const known = await Build.findOne({ where: { benchId, name: request.name } });
    if (known === null) await createBuild({ actor: lead, request });
  }
  let uploadCount = 0;
  for (const session of DEMO_SESSIONS) {
    const sessionId = await ensureSession(session, lead, benchId);
    for (const recording of session.recordings) {
      await upload(recording, sessionId, member);
      uploadCount += 1;
    }
  }
  await audit({ action: SCENARIO_CREATED, accountId: null, benchId });
  return uploadCount;
}

async function ensureSession({ request, buildName }: DemoSession, lead: Actor, benchId: string): Promise<string> {
  const known = await Session.findOne({ where: { benchId, title: request.title } });
  if (known) return known.id;
  const build = await Build.findOne({ where: { benchId, name: buildName }, rejectOnEmpty: true });
  const { session } = await createSession({ actor: lead, request: { ...request, buildId: build.id } });
  return session.id;
}

async function upload({ fileName, fields, makeWav }: DemoRecording, sessionId: string, member: Actor): Promise<void> {
  const temporary = await blobStorage().createTemporary();
  const wav = makeWav();
  const written = await writeHashed({
    source: Readable.from([wav]),
    target: temporary,
    maximumBytes: wav.length,
    tooLarge: () => new Error('seedScenario: a recording outgrew itself'),
  });
  await createRecording({
    actor: member,
    upload: { temporary, fileName, ...written },
    fields: { ...fields, sessionId },
    idempotencyKey: `demo:${fileName}`,
  });
}
