import pg from 'pg';

/**
 * Lets nobody write to some tables until released, so that a job stays in the middle of its work for as long as a test
 * needs, however fast the machine. The release is harmless where the server has crashed meanwhile.
 */
export async function hold(...tables: string[]): Promise<() => Promise<void>> {
  const client = new pg.Client(process.env.DATABASE_URL);
  client.on('error', () => undefined);
  await client.connect();
  await client.query('BEGIN');
  await client.query(`LOCK TABLE ${tables.join(', ')} IN SHARE MODE`);
  return () => client.end().catch(() => undefined);
}
