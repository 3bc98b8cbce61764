/** Version of the measurement method. Any change that can move a figure raises it. */
export const ENGINE_VERSION = '0.3.1';
