import { SERIES_NAMES, type Series, type SeriesName } from '#lib/analysis/series.ts';
import { notFound, ServerError } from '../errors.ts';
import { Reading } from '../models/Reading.ts';
import { ReadingSeries } from '../models/ReadingSeries.ts';
import { readableBenchIds } from '../policies/abilities.ts';
import type { Actor } from '../policies/actor.ts';

/** @throws ServerError not-found for the reading, no-such-series for a name that it does not have. */
export async function getSeries(wanted: { actor: Actor; readingId: string; name: string }): Promise<Series> {
  const where = { id: wanted.readingId, benchId: readableBenchIds(wanted.actor) };
  const reading = await Reading.findOne({ where, attributes: ['id', 'benchId'] });
  if (reading === null) throw notFound('reading');
  const { name } = wanted;
  const stored = isSeriesName(name)
    ? await ReadingSeries.findOne({ where: { benchId: reading.benchId, readingId: reading.id, name } })
    : null;
  if (stored === null) throw noSuchSeries();
  return { name: stored.name, columns: readColumns(stored) };
}

/** Value by value: a BLOB starts anywhere in memory, where no view of 32-bit floats can be laid over it. */
function readColumns({ columnsLayout, payload }: ReadingSeries): Series['columns'] {
  let offset = 0;
  return columnsLayout.map(({ name, unit, length }) => {
    const start = offset;
    offset += length * Float32Array.BYTES_PER_ELEMENT;
    const valueAt = (_: unknown, index: number) => payload.readFloatLE(start + index * Float32Array.BYTES_PER_ELEMENT);
    return { name, unit, values: Float32Array.from({ length }, valueAt) };
  });
}

function isSeriesName(name: string): name is SeriesName {
  return (SERIES_NAMES as readonly string[]).includes(name);
}

function noSuchSeries(): ServerError {
  return new ServerError({
    code: 'no-such-series',
    detail: 'This reading has no such series. Its seriesNames say which there are.',
  });
}
