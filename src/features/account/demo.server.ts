import { hashPassword } from 'better-auth/crypto';
import { Account, newId, sequelize, User } from '@/server/models';
import { DEMO_PASSWORD, DEMO_PEOPLE } from './demo';

/** Makes the demo people who are missing, verified and able to sign in. Answers with their ids by role. */
export async function ensureDemoPeople(): Promise<Record<string, string>> {
  const ids: Record<string, string> = {};
  for (const person of DEMO_PEOPLE) {
    const known = await User.findOne({ where: { email: person.email } });
    if (known) {
      ids[person.role] = known.id;
      continue;
    }
    const password = await hashPassword(DEMO_PASSWORD);
    ids[person.role] = await sequelize.transaction(async (transaction) => {
      const user = await User.create(
        { id: newId(), name: person.name, email: person.email, emailVerified: true },
        { transaction },
      );
      await Account.create(
        { id: newId(), accountId: user.id, providerId: 'credential', userId: user.id, password },
        { transaction },
      );
      return user.id;
    });
  }
  return ids;
}
