import { plainNumberText } from '#lib/format/numberText.ts';
import { parseNumber } from '#lib/format/parseNumber.ts';
import type { BuildView, Geometry } from '#lib/schemas/build.ts';

export const GEOMETRY_PARTS = ['segments', 'poles', 'blades', 'teeth', 'magnets'] as const;
export type GeometryPart = (typeof GEOMETRY_PARTS)[number];

/** A build as it is typed. */
export type BuildTexts = Record<GeometryPart, string> & {
  readonly name: string;
  /** Empty: as the geometry says. */
  readonly eventsPerTurn: string;
  readonly rpmMin: string;
  readonly rpmMax: string;
  readonly notes: string;
};

export const NO_BUILD_TEXTS: BuildTexts = {
  name: '',
  segments: '',
  poles: '',
  blades: '',
  teeth: '',
  magnets: '',
  eventsPerTurn: '',
  rpmMin: '',
  rpmMax: '',
  notes: '',
};

const textOf = (value: number | null) => (value === null ? '' : plainNumberText(value));

/** What stands in the boxes for a build that exists. */
export function buildTexts({ name, geometry, rpmMin, rpmMax, notes, ...build }: BuildView): BuildTexts {
  return {
    name,
    segments: textOf(geometry.segments),
    poles: textOf(geometry.poles),
    blades: textOf(geometry.blades),
    teeth: textOf(geometry.teeth),
    magnets: textOf(geometry.magnets),
    eventsPerTurn: build.eventsPerTurnOrigin === 'given' ? textOf(build.eventsPerTurn) : '',
    rpmMin: textOf(rpmMin),
    rpmMax: textOf(rpmMax),
    notes: notes ?? '',
  };
}

/** What the boxes mean; NaN for a figure that is none, so that the schema refuses it. */
export function buildOf(texts: BuildTexts) {
  return {
    name: texts.name,
    geometry: geometryOf(texts),
    eventsPerTurn: parseNumber(texts.eventsPerTurn),
    rpmMin: parseNumber(texts.rpmMin),
    rpmMax: parseNumber(texts.rpmMax),
    notes: texts.notes.trim() || null,
  };
}

/** The geometry as typed so far. */
export function geometryOf(texts: Pick<BuildTexts, GeometryPart>): Geometry {
  return {
    segments: parseNumber(texts.segments),
    poles: parseNumber(texts.poles),
    blades: parseNumber(texts.blades),
    teeth: parseNumber(texts.teeth),
    magnets: parseNumber(texts.magnets),
  };
}
