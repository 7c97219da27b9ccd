import type { InputReport } from '../report';
import type { RawMesh } from './raw-mesh';

/** What the report says of a file with several bodies, left-out objects or converted surfaces. */
export function describeSource(raw: RawMesh): Pick<InputReport, 'bodies' | 'leftOut' | 'deflectionMm'> {
  return {
    ...(raw.bodies === undefined ? {} : { bodies: raw.bodies }),
    ...(raw.leftOut === undefined || raw.leftOut.length === 0 ? {} : { leftOut: raw.leftOut }),
    ...(raw.deflectionMm === undefined ? {} : { deflectionMm: raw.deflectionMm }),
  };
}
