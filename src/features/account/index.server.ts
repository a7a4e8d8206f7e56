export { actorOf, hashToken } from './actor.server';
export { auth, trustedOrigins } from './auth.server';
export { ensureDemoPeople } from './demo.server';
export { invitationLetter } from './emails/letters';
