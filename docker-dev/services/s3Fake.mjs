// An object store in memory, for containers and tests. Usage: node s3Fake.mjs PORT BUCKET [HOST]
import { CreateBucketCommand, S3Client } from '@aws-sdk/client-s3';
import { buildApp } from 'fauxqs';

const [, , port, bucket, host = '127.0.0.1'] = process.argv;
if (!port || !bucket) {
  process.stderr.write('usage: node s3Fake.mjs PORT BUCKET [HOST]\n');
  process.exit(2);
}
const app = buildApp({ logger: false });
await app.listen({ port: Number(port), host });
const client = new S3Client({
  region: 'eu-central-1',
  endpoint: `http://127.0.0.1:${port}`,
  forcePathStyle: true,
  credentials: { accessKeyId: 'fake', secretAccessKey: 'fake' },
});
await client.send(new CreateBucketCommand({ Bucket: bucket }));
process.stdout.write(`s3: bucket ${bucket} on port ${port}\n`);
for (const signal of ['SIGTERM', 'SIGINT']) process.once(signal, () => void app.close().then(() => process.exit(0)));
