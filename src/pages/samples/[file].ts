import type { APIRoute } from 'astro';
import { generateSaltmarsh, MEMBERS_FILE, TIES_FILE } from '../../../db/seeders/saltmarsh';

/** Two files of the invented Saltmarsh community, to try an import with. */
export const GET: APIRoute = ({ params }) => {
  if (params.file !== TIES_FILE && params.file !== MEMBERS_FILE) return new Response(null, { status: 404 });
  const { tiesCsv, membersCsv } = generateSaltmarsh().snapshots.at(-1)!;
  return new Response(params.file === TIES_FILE ? tiesCsv : membersCsv, {
    headers: {
      'content-type': 'text/csv; charset=utf-8',
      'content-disposition': `attachment; filename="${params.file}"`,
      'cache-control': 'public, max-age=86400',
    },
  });
};
