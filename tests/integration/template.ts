/** Database that every integration test file gets a copy of. */
export const TEMPLATE = 'thrum_template';
