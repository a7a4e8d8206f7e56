import { createHmac } from 'node:crypto';
import { config } from '@/server/config';

/**
 * A short code that stands for a member where names are hidden: each viewer sees a different set, so that two
 * viewers cannot join what they see, and the code tells nothing about the member.
 */
export const memberCode = (viewerId: string, memberId: string): string =>
  `m-${createHmac('sha256', config().AUTH_SECRET).update(`${viewerId}|${memberId}`).digest('hex').slice(0, 8)}`;
