/** Most entries of an archive. */
export const MAX_ENTRIES = 1_000;
/** Most bytes of one unpacked part, and of all that are read together. */
export const MAX_PART_BYTES = 800_000_000;
export const MAX_TOTAL_BYTES = 1_000_000_000;
/** Most bytes of a relationships part. */
export const MAX_RELATIONS_BYTES = 1_000_000;
/** Most bytes of one tag, with its attributes. */
export const MAX_TAG_BYTES = 256 * 1024;
/** Deepest nesting of elements, and of components. */
export const MAX_XML_DEPTH = 100;
export const MAX_COMPONENT_DEPTH = 32;
/** Most characters of a path to a part, as a part's name has them, and of an object's name that are kept. */
export const MAX_PATH = 1_024;
export const MAX_NAME = 80;
/** Most objects and components of all parts together, and most placed meshes. */
export const MAX_OBJECTS = 100_000;
export const MAX_COMPONENTS = 200_000;
export const MAX_PLACED = 100_000;
