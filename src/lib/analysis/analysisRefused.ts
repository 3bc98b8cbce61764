/** Why samples cannot be analysed at all. */
export type RefusalCode = 'not-finite' | 'out-of-range';

/** Input that is no sound: the recording fails with this code instead of getting a reading. */
export class AnalysisRefused extends Error {
  override readonly name = 'AnalysisRefused';
  readonly code: RefusalCode;

  constructor(code: RefusalCode, message: string) {
    super(message);
    this.code = code;
  }
}
