/**
 * An invented model club and four motors that its members built: what a bench looks like after an evening's work.
 * Nothing here stands for a real person, place or product.
 */
import type { CreateBuildRequest } from '#lib/schemas/build.ts';
import type { UploadFields } from '#lib/schemas/recording.ts';
import type { CreateSessionRequest } from '#lib/schemas/session.ts';
import { brokenWav, coastDownSpeed, DEMO_MOTORS, motorWav, stalledWav, steadyWav } from './demoSounds.ts';

export interface DemoRecording {
  /** Unique within the demo; makes the upload repeatable. */
  readonly fileName: string;
  readonly fields: Pick<UploadFields, 'supplyVolts' | 'currentAmps' | 'note'>;
  /** What the shaft really does: the median speed while it turns, rpm; null when it does not, or nobody can tell. */
  readonly trueRpm: number | null;
  readonly makeWav: () => Buffer;
}

export interface DemoSession {
  readonly request: Omit<CreateSessionRequest, 'buildId' | 'benchId'>;
  readonly buildName: string;
  readonly recordings: readonly DemoRecording[];
}

const NO_PARTS = { poles: null, segments: null, blades: null, teeth: null, magnets: null } as const;

export const DEMO_BUILDS: readonly Omit<CreateBuildRequest, 'benchId'>[] = [
  {
    name: 'Heron',
    geometry: { ...NO_PARTS, poles: 2, segments: 2 },
    rpmMin: 300,
    rpmMax: 4000,
    notes: 'Wound by hand on a cork, two copper-strip contacts. Starts with a push.',
  },
  {
    name: 'Kestrel',
    geometry: { ...NO_PARTS, poles: 2, segments: 3 },
    rpmMin: 1000,
    rpmMax: 20_000,
    notes: 'Three arms, 0.25 mm wire, 90 turns an arm.',
  },
  {
    name: 'Dunlin',
    geometry: { ...NO_PARTS, poles: 2, segments: 5 },
    notes: 'Five segments, brass flywheel of 42 g pressed on.',
  },
  {
    name: 'Swift',
    geometry: { ...NO_PARTS, blades: 4 },
    rpmMin: 500,
    rpmMax: 10_000,
    notes: 'Bench fan with a printed four-blade rotor.',
  },
];

const CONDITIONS = { supplyVolts: null, load: 'no load', ambientCelsius: 21, note: null } as const;

/** Supply in V, current in A, speed in rpm. */
const KESTREL_SWEEP = [
  [1.5, 0.21, 3214],
  [2, 0.22, 4571],
  [2.5, 0.24, 5962],
  [3, 0.25, 7308],
  [3.5, 0.27, 8702],
  [4, 0.28, 10_041],
] as const;

const HERON_RPM = [1462, 1468, 1457, 1465] as const;
const HERON_VOLTS = 4.5;

const DUNLIN_COAST = {
  startRpm: 6200,
  cutSeconds: 1.5,
  constantRpmPerSecond: 500,
  proportionalPerSecond: 0.25,
  durationSeconds: 9,
} as const;

export const DEMO_SESSIONS: readonly DemoSession[] = [
  {
    request: { title: 'Kestrel from 1 to 4 V', purpose: 'voltage-sweep', conditions: CONDITIONS },
    buildName: 'Kestrel',
    recordings: [
      {
        fileName: 'kestrel-1v0.wav',
        fields: { supplyVolts: 1, currentAmps: 0.62, note: 'Does not start at this voltage.' },
        trueRpm: null,
        makeWav: () => stalledWav(100),
      },
      ...KESTREL_SWEEP.map(([supplyVolts, currentAmps, trueRpm], index) => ({
        fileName: `kestrel-${supplyVolts.toFixed(1).replace('.', 'v')}.wav`,
        fields: { supplyVolts, currentAmps },
        trueRpm,
        makeWav: () => steadyWav(101 + index, DEMO_MOTORS.kestrel, trueRpm),
      })),
    ],
  },
  {
    request: {
      title: 'Dunlin runs down with the flywheel',
      purpose: 'coast-down',
      conditions: { ...CONDITIONS, supplyVolts: 3, note: 'Supply cut after about a second and a half.' },
    },
    buildName: 'Dunlin',
    recordings: [
      {
        fileName: 'dunlin-coast-down.wav',
        fields: { supplyVolts: 3 },
        trueRpm: null,
        makeWav: () => {
          const { durationSeconds } = DUNLIN_COAST;
          return motorWav({
            seed: 200,
            motor: DEMO_MOTORS.dunlin,
            durationSeconds,
            speed: coastDownSpeed(DUNLIN_COAST),
          });
        },
      },
    ],
  },
  {
    request: {
      title: 'Heron, four starts',
      purpose: 'speed-check',
      conditions: { ...CONDITIONS, supplyVolts: HERON_VOLTS },
    },
    buildName: 'Heron',
    recordings: [
      ...HERON_RPM.map((trueRpm, index) => ({
        fileName: `heron-start-${index + 1}.wav`,
        fields: { supplyVolts: HERON_VOLTS },
        trueRpm,
        makeWav: () => steadyWav(300 + index, DEMO_MOTORS.heron, trueRpm),
      })),
      {
        fileName: 'heron-start-5.wav',
        fields: { supplyVolts: HERON_VOLTS, note: 'The recorder crashed before it was saved.' },
        trueRpm: null,
        makeWav: () => brokenWav(304, DEMO_MOTORS.heron, HERON_RPM[0]),
      },
    ],
  },
  {
    request: {
      title: 'Swift with and without its guard',
      purpose: 'speed-check',
      conditions: { ...CONDITIONS, supplyVolts: 5, load: 'own rotor' },
    },
    buildName: 'Swift',
    recordings: [
      ['swift-open.wav', 2412, 'Guard off.'] as const,
      ['swift-guarded.wav', 2358, 'Guard on.'] as const,
    ].map(([fileName, trueRpm, note], index) => ({
      fileName,
      fields: { supplyVolts: 5, note },
      trueRpm,
      makeWav: () => steadyWav(400 + index, DEMO_MOTORS.swift, trueRpm),
    })),
  },
];
