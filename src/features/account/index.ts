export { accountOperations, type Me } from './account';
export { DEMO_PASSWORD, DEMO_PEOPLE } from './demo';
