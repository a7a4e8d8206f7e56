import { join } from 'node:path';
import { startMailFake } from './mail';
import { startS3Fake } from './s3';

export interface Fakes {
  /** Variables that point the product at the fakes. */
  readonly env: Readonly<Record<string, string>>;
  stop(): Promise<void>;
}

/** Local stand-ins for the hosted services, behind the same packages as the real ones. */
export async function startFakes({ dataDir }: { dataDir: string }): Promise<Fakes> {
  const mail = await startMailFake(join(dataDir, 'mail'));
  const s3 = await startS3Fake(join(dataDir, 's3'));
  return {
    env: {
      SMTP_URL: mail.smtpUrl,
      MAIL_FAKE_URL: mail.httpUrl,
      S3_ENDPOINT: s3.endpoint,
      S3_REGION: 'local',
      S3_BUCKET: 'thrum',
      S3_ACCESS_KEY_ID: 'local',
      S3_SECRET_ACCESS_KEY: 'local-only',
    },
    stop: async () => {
      await mail.stop();
      await s3.stop();
    },
  };
}
