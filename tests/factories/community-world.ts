import type { Actor } from '@/lib/actor';
import { ensureBucket } from '@/server/storage';
import { actorOf } from '../integration/call';
import { createTestDatabase } from '../integration/database';
import { makeCommunity } from './imports';

/** One community in a database of the test file's own, and an analyst who loads and reads it. */
export interface CommunityWorld {
  readonly actor: Actor;
  readonly communityId: string;
  close(): Promise<void>;
}

/** The people and the place alone, in the database that DATABASE_URL names. */
export async function settleCommunity(): Promise<Omit<CommunityWorld, 'close'>> {
  await ensureBucket();
  const { workspaceId, communityId } = await makeCommunity();
  return { communityId, actor: actorOf('analyst', workspaceId, 'analyst') };
}

/** Makes the database; call it before anything imports the models. */
export async function makeCommunityWorld(): Promise<CommunityWorld> {
  const database = await createTestDatabase();
  return {
    ...(await settleCommunity()),
    close: async () => {
      const { sequelize } = await import('@/server/models');
      await sequelize.close();
      await database.drop();
    },
  };
}
