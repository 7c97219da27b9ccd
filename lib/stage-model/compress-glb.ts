import { WebIO, type Document } from '@gltf-transform/core';
import { EXTMeshoptCompression, KHRMeshQuantization } from '@gltf-transform/extensions';
import { MeshoptEncoder } from 'meshoptimizer/encoder';

/**
 * Binary glTF 2.0 with EXT_meshopt_compression and KHR_mesh_quantization, both required of the reader.
 * @param method `QUANTIZE` keeps the numbers as they are; `FILTER` packs floating-point normals by a filter
 */
export async function compressGlb(doc: Document, method: 'QUANTIZE' | 'FILTER'): Promise<Uint8Array> {
  await MeshoptEncoder.ready;
  doc.createExtension(KHRMeshQuantization).setRequired(true);
  doc
    .createExtension(EXTMeshoptCompression)
    .setRequired(true)
    .setEncoderOptions({ method: EXTMeshoptCompression.EncoderMethod[method] });
  const io = new WebIO()
    .registerExtensions([EXTMeshoptCompression, KHRMeshQuantization])
    .registerDependencies({ 'meshopt.encoder': MeshoptEncoder });
  return io.writeBinary(doc);
}
