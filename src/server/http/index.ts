export { serve, type Call } from './serve';
export { problemResponse } from './problems';
export { validate } from './input';
