import type { AstroGlobal } from 'astro';
import { ProblemError } from '@/lib/problem';
import type { Actor } from '@/lib/actor';
import type { Action } from '@/features/workspaces';
import type { Place } from './shell';
import { openPlace, type OpenPlace } from './shell.server';

/**
 * Opens a place for a page, from its address. Answers with a redirect to the sign-in page for strangers, and with
 * the error page (its status kept) where the place is not theirs.
 */
export async function pagePlace(
  astro: Pick<AstroGlobal, 'params' | 'url' | 'locals' | 'redirect' | 'rewrite'>,
  place: Place,
  action: Action,
): Promise<(OpenPlace & { actor: Actor }) | Response> {
  const { actor } = astro.locals;
  if (!actor)
    return astro.redirect(`/sign-in?next=${encodeURIComponent(astro.url.pathname + astro.url.search)}`);
  const { workspace, community } = astro.params;
  const uuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;
  const snapshot = astro.url.searchParams.get('snapshot');
  if (
    !uuid.test(workspace ?? '') ||
    (community && !uuid.test(community)) ||
    (snapshot && !uuid.test(snapshot))
  )
    return astro.rewrite('/404');
  try {
    const opened = await openPlace(actor, {
      workspaceId: workspace!,
      ...(community ? { communityId: community } : {}),
      snapshotId: snapshot,
      place,
      action,
    });
    return { ...opened, actor };
  } catch (error) {
    if (error instanceof ProblemError && error.status === 404) return astro.rewrite('/404');
    if (error instanceof ProblemError && error.status === 403) return astro.rewrite('/403');
    throw error;
  }
}
