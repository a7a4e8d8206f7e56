export { abilities, ACTIONS, can, mayGrant, seesNames, type Action } from './policy';
