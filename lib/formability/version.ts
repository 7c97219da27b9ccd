/** Version of the engine; a change of any figure it reports raises it. */
export const ENGINE_VERSION = '1.2.0';
