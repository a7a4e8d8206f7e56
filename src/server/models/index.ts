/** Every model, defined once; importing this file defines them all. */
export * from './account';
export * from './workspace';
export * from './community';
export * from './network';
export * from './analysis';
export * from './review';
export * from './operations';
export * from './recipe';
export { newId } from './columns';
export { sequelize } from '../database/connection';
