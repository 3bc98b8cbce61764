declare module 'wav-decoder' {
  export interface DecodedWav {
    readonly numberOfChannels: number;
    readonly length: number;
    readonly sampleRate: number;
    /** One array per channel, full scale ±1. */
    readonly channelData: Float32Array[];
  }

  export interface DecodeOptions {
    /** Divides positive and negative integers by the same number. */
    readonly symmetric?: boolean;
  }

  interface Decode {
    (wav: ArrayBuffer, options?: DecodeOptions): Promise<DecodedWav>;
    sync(wav: ArrayBuffer, options?: DecodeOptions): DecodedWav;
  }

  const wavDecoder: { readonly decode: Decode };
  export default wavDecoder;
}
