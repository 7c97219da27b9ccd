// Node 20 does not hand a loader given by --import on to worker threads, so each thread brings its own.
import { tsImport } from 'tsx/esm/api';

const { analyseMesh, inspectMesh } = await tsImport('./engine-thread.ts', import.meta.url);
export { analyseMesh, inspectMesh };
