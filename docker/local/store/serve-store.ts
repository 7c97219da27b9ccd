// The local object store as a process of its own: s3rver behind our strict front, on loopback.
import { createServer } from 'node:http';
import S3rver from 's3rver';
import { DUMMY_ACCOUNT } from 's3rver/lib/models/account.js';
import { z } from 'zod';
import { strictFront } from './strict-front';

const settings = z
  .object({
    STORE_FOLDER: z.string().min(1),
    STORE_PORT: z.coerce.number().int(),
    STORE_ORIGINS: z.string().transform((list) => list.split(',')),
    S3_BUCKET: z.string().min(1),
    S3_ACCESS_KEY_ID: z.string().min(1),
    S3_SECRET_ACCESS_KEY: z.string().min(1),
  })
  .parse(process.env);

// Browsers upload parts straight to the store and must read each part's ETag.
const cors = `<CORSConfiguration><CORSRule>
  ${settings.STORE_ORIGINS.map((origin) => `<AllowedOrigin>${origin}</AllowedOrigin>`).join('\n  ')}
  ${['GET', 'PUT', 'HEAD', 'POST', 'DELETE'].map((method) => `<AllowedMethod>${method}</AllowedMethod>`).join('\n  ')}
  <AllowedHeader>*</AllowedHeader>
  <ExposeHeader>ETag</ExposeHeader>
  <ExposeHeader>Content-Range</ExposeHeader>
  <MaxAgeSeconds>3600</MaxAgeSeconds>
</CORSRule></CORSConfiguration>`;

const store = new S3rver({
  directory: settings.STORE_FOLDER,
  silent: true,
  vhostBuckets: false,
  configureBuckets: [{ name: settings.S3_BUCKET, configs: [cors] }],
});
DUMMY_ACCOUNT.revokeAccessKey('S3RVER');
DUMMY_ACCOUNT.createKeyPair(settings.S3_ACCESS_KEY_ID, settings.S3_SECRET_ACCESS_KEY);
await store.configureBuckets();

const server = createServer(
  // Large uploads over a slow link may take long; only silence ends a connection.
  { requestTimeout: 0 },
  strictFront(store, {
    accessKeyId: settings.S3_ACCESS_KEY_ID,
    secretAccessKey: settings.S3_SECRET_ACCESS_KEY,
  }),
);
server.listen(settings.STORE_PORT, '127.0.0.1', () =>
  console.log(`object store on 127.0.0.1:${settings.STORE_PORT}`),
);
for (const signal of ['SIGTERM', 'SIGINT'] as const) {
  process.once(signal, () => {
    server.close(() => process.exit(0));
    server.closeAllConnections();
  });
}
