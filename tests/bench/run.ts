import { benchDense } from './dense';
import { benchEigen } from './eigen';
import { benchSmoothing } from './smoothing';

/**
 * `npm run bench -- [eigen] [dense] [smoothing] [quick]`: times and ratios beside a peer in the same run; all parts
 * when none is named. Figures drift with the machine's other work: compare within one run.
 */
const asked = process.argv.slice(2);
const quick = asked.includes('quick');
const parts = asked.filter((one) => one !== 'quick');
const wanted = (part: string): boolean => parts.length === 0 || parts.includes(part);

if (wanted('eigen')) benchEigen(quick);
if (wanted('dense')) benchDense(quick);
if (wanted('smoothing')) benchSmoothing();
