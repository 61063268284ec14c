/** The version of the engine, stated in every result: a change of any number changes it. */
export const ENGINE_VERSION = '0.1.0';
