import { parseNumber } from '#lib/format/parseNumber.ts';
import { plainNumberText } from '#lib/format/numberText.ts';
import { analyseAgainRequest, type AnalyseAgainRequest, type ReadingView } from '#lib/schemas/reading.ts';

/** The settings of an analysis as typed; an empty one is left to the recording and its build. */
export interface AnalyseAgainForm {
  readonly eventsPerTurn: string;
  readonly orders: string;
  readonly rpmMin: string;
  readonly rpmMax: string;
  readonly channel: string;
  readonly fromSeconds: string;
  readonly toSeconds: string;
}

const EMPTY: AnalyseAgainForm = {
  eventsPerTurn: '',
  orders: '',
  rpmMin: '',
  rpmMax: '',
  channel: 'auto',
  fromSeconds: '',
  toSeconds: '',
};

/** The settings that the last reading was made with. */
export function formOfReading(reading: ReadingView | null): AnalyseAgainForm {
  if (reading === null) return EMPTY;
  const { eventsPerTurn, orders, rpmMin, rpmMax, channel, fromSeconds, toSeconds } = reading.settings;
  const text = (value: number | null) => (value === null ? '' : plainNumberText(value));
  return {
    eventsPerTurn: text(eventsPerTurn),
    orders: orders.map(plainNumberText).join(', '),
    rpmMin: text(rpmMin),
    rpmMax: text(rpmMax),
    channel: String(channel),
    fromSeconds: text(fromSeconds),
    toSeconds: text(toSeconds),
  };
}

export type CheckedSettings =
  | { readonly isValid: true; readonly settings: AnalyseAgainRequest }
  | { readonly isValid: false; readonly errors: Partial<Record<keyof AnalyseAgainForm, string>> };

const LIST_SEPARATOR = /[;,]\s+|[;\s]+/u;

/** The request that the form stands for, or what is wrong with which field. */
export function checkSettings(form: AnalyseAgainForm): CheckedSettings {
  const orders = form.orders.trim() === '' ? null : form.orders.trim().split(LIST_SEPARATOR).map(parseNumber);
  const given = Object.entries({
    eventsPerTurn: parseNumber(form.eventsPerTurn),
    orders,
    rpmMin: parseNumber(form.rpmMin),
    rpmMax: parseNumber(form.rpmMax),
    channel: form.channel === 'auto' ? 'auto' : parseNumber(form.channel),
    fromSeconds: parseNumber(form.fromSeconds),
    toSeconds: parseNumber(form.toSeconds),
  }).filter(([, value]) => value !== null);
  const parsed = analyseAgainRequest.safeParse(Object.fromEntries(given));
  if (!parsed.success) {
    return {
      isValid: false,
      errors: Object.fromEntries(parsed.error.issues.map((issue) => [String(issue.path[0]), issue.message])),
    };
  }
  return crossCheck(parsed.data);
}

function crossCheck(settings: AnalyseAgainRequest): CheckedSettings {
  const { rpmMin = 0, rpmMax = Infinity, fromSeconds = 0, toSeconds = Infinity } = settings;
  if (rpmMin >= rpmMax) return { isValid: false, errors: { rpmMax: 'Must be above the slowest speed.' } };
  if (fromSeconds >= toSeconds) return { isValid: false, errors: { toSeconds: 'Must be after the start.' } };
  return { isValid: true, settings };
}
