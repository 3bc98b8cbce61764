import { notFound } from '../errors.ts';
import { Build } from '../models/Build.ts';
import { countRecordingsByBuild, NO_RECORDINGS } from '../models/recordingCounts.ts';
import { readableBenchIds } from '../policies/abilities.ts';
import type { Actor } from '../policies/actor.ts';

/** A build with what its page tells about it. */
export interface BuildDetails {
  readonly build: Build;
  readonly recordingCount: number;
}

/** @throws ServerError not-found */
export async function getBuild({ actor, buildId }: { actor: Actor; buildId: string }): Promise<BuildDetails> {
  const build = await loadReadableBuild(actor, buildId);
  const [details] = await withRecordingCounts([build]);
  return details ?? { build, recordingCount: 0 };
}

/** The bench belongs to the question: a foreign build is not there. @throws ServerError not-found */
export async function loadReadableBuild(actor: Actor, buildId: string): Promise<Build> {
  const build = await Build.findOne({ where: { id: buildId, benchId: readableBenchIds(actor) } });
  if (build === null) throw notFound('build');
  return build;
}

export async function withRecordingCounts(builds: readonly Build[]): Promise<BuildDetails[]> {
  const counts = await countRecordingsByBuild({
    benchIds: [...new Set(builds.map(({ benchId }) => benchId))],
    ids: builds.map(({ id }) => id),
  });
  return builds.map((build) => ({ build, recordingCount: (counts.get(build.id) ?? NO_RECORDINGS).recordingCount }));
}
