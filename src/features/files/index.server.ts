import { isGraph } from './files';
import type { OpenedFile } from './read.server';

export { openFile, type OpenedFile, type SourceFile } from './read.server';

export const isGraphLayout = ({ layout }: OpenedFile): boolean => isGraph(layout.format);
