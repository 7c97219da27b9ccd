import { uuidv7 } from 'uuidv7';

/** Object names are made here, never from anything that a person typed. */
const key = (area: 'uploads' | 'derivatives' | 'packs', workspaceId: string) =>
  `${area}/${workspaceId}/${uuidv7()}`;

/** `uploads/<workspace>/<uuid>`: the exact bytes of a posted model, for ever. */
export const uploadKey = (workspaceId: string) => key('uploads', workspaceId);
/** `derivatives/<workspace>/<uuid>`: what pages show of a mesh; may be made anew. */
export const derivativeKey = (workspaceId: string) => key('derivatives', workspaceId);
/** `packs/<workspace>/<uuid>`: a release pack as it was built. */
export const packKey = (workspaceId: string) => key('packs', workspaceId);
