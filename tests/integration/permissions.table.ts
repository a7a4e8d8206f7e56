import type { Role } from '@/lib/actor';
import type { Action } from '@/features/workspaces';
import type { WalkFixture } from './permissions.fixture';

export interface WalkEndpoint {
  /** What a role must be able to do; null where every signed-in person sees only their own. */
  readonly needs: Action | null;
  /** Narrower than `needs`: the fixture's view belongs to the analyst, and what is theirs others may not change. */
  readonly only?: readonly Role[];
  /** Roles that may do this to their own, and find nothing of theirs here: 404. */
  readonly notTheirs?: readonly Role[];
  readonly query?: (fixture: WalkFixture) => Record<string, string>;
  readonly body?: (fixture: WalkFixture) => unknown;
}

const see = (needs: Action | null, query?: WalkEndpoint['query']): WalkEndpoint =>
  query ? { needs, query } : { needs };
const change = (needs: Action, body?: WalkEndpoint['body'], only?: readonly Role[]): WalkEndpoint => ({
  needs,
  ...(body ? { body } : {}),
  ...(only ? { only } : {}),
});
const SHARERS: readonly Role[] = ['owner', 'admin', 'analyst'];

/** Endpoints that answer anyone. */
export const PUBLIC = ['GET /openapi.json'];

const REASON = 'Looked at recent posts and asked two raters.';

/** Every other endpoint, with what it needs and a request that is well formed. */
export const ENDPOINTS: Readonly<Record<string, WalkEndpoint>> = {
  'GET /me': see(null),

  'GET /workspaces/{workspace}': see('workspace.manage'),
  'PATCH /workspaces/{workspace}': change('workspace.manage', () => ({ neighbourFloor: 5 })),
  'GET /workspaces/{workspace}/people': see('workspace.manage'),
  'PATCH /workspaces/{workspace}/people/{person}': change('workspace.manage', () => ({ role: 'viewer' })),
  'DELETE /workspaces/{workspace}/people/{person}': change('workspace.manage'),
  'GET /workspaces/{workspace}/invitations': see('workspace.manage'),
  'POST /workspaces/{workspace}/invitations': change('workspace.manage', () => ({
    email: 'new@test.example',
    role: 'viewer',
  })),
  'DELETE /workspaces/{workspace}/invitations/{invitation}': change('workspace.manage'),
  'GET /workspaces/{workspace}/tokens': see('explore.open'),
  'POST /workspaces/{workspace}/tokens': change('explore.open', () => ({ name: 'Walked' })),
  // The fixture's token is the admin's: others who may have tokens find none of their own by its id.
  'DELETE /workspaces/{workspace}/tokens/{token}': {
    ...change('explore.open'),
    notTheirs: ['analyst', 'moderator'],
  },
  'GET /workspaces/{workspace}/audit': see('workspace.manage'),

  'GET /workspaces/{workspace}/communities': see('brief.open'),
  'POST /workspaces/{workspace}/communities': change('analysis.make', () => ({ name: 'Walked' })),
  'GET /communities/{community}/imports': see('analysis.make'),
  'POST /communities/{community}/imports': change('analysis.make'),
  'GET /imports/{import}': see('analysis.make'),
  'GET /imports/{import}/problems.csv': see('analysis.make'),
  'GET /imports/{import}/problems': see('analysis.make', () => ({ kind: '0' })),
  'GET /communities/{community}/recipes': see('analysis.make'),
  'POST /communities/{community}/recipes': change('analysis.make', () => ({ name: 'Walked', options: {} })),
  // The fixture's recipe is the analyst's and not shared.
  'PATCH /recipes/{recipe}': {
    ...change('analysis.make', () => ({ name: 'Walked' })),
    notTheirs: ['owner', 'admin'],
  },
  'DELETE /recipes/{recipe}': {
    ...change('analysis.make'),
    notTheirs: ['owner', 'admin'],
  },
  'POST /imports/{import}/accept': change('analysis.make'),
  'POST /imports/{import}/discard': change('analysis.make'),
  'GET /communities/{community}/snapshots': see('explore.open'),
  'GET /snapshots/{snapshot}': see('explore.open'),
  'GET /snapshots/{snapshot}/network': see('explore.open'),
  'GET /snapshots/{snapshot}/spectrum': see('explore.open', () => ({ count: '2' })),
  'GET /snapshots/{snapshot}/ties.csv': see('export.tables'),
  'GET /snapshots/{snapshot}/network.gexf': see('export.tables'),
  'GET /snapshots/{snapshot}/network.graphml': see('export.tables'),

  'GET /jobs/{job}': see('explore.open'),
  // Only the person who started a job and admins stop it; the fixture's was started by the moderator.
  'DELETE /jobs/{job}': change('explore.open', undefined, ['owner', 'admin', 'moderator']),
  'GET /jobs/{job}/events': see('explore.open'),

  'GET /communities/{community}/views': see('views.open'),
  'POST /communities/{community}/views': change('views.save', (f) => ({
    name: 'Walked',
    place: 'map',
    snapshotId: f.params.snapshot,
    state: {},
  })),
  'GET /views/{view}': see('views.open'),
  'PATCH /views/{view}': change('views.save', () => ({ version: 99, name: 'Walked' }), ['analyst']),
  'DELETE /views/{view}': change('views.save', undefined, SHARERS),
  'GET /views/{view}/shares': change('views.save', undefined, SHARERS),
  'POST /views/{view}/shares': change('views.save', () => ({ role: 'moderator' }), SHARERS),
  'DELETE /views/{view}/shares/{share}': change('views.save', undefined, SHARERS),
  'GET /views/{view}/comments': see('views.open'),
  'POST /views/{view}/comments': change('views.open', () => ({ body: 'Walked by.' })),

  'GET /snapshots/{snapshot}/members': see('explore.open', () => ({ columns: 'degree' })),
  'GET /snapshots/{snapshot}/members/{member}': see('explore.open'),
  'GET /snapshots/{snapshot}/members.csv': see('export.tables'),
  'GET /snapshots/{snapshot}/members.jsonl': see('export.tables'),
  'GET /snapshots/{snapshot}/members.xlsx': see('export.tables'),
  'GET /snapshots/{snapshot}/members.parquet': see('export.tables'),
  'GET /snapshots/{snapshot}/values': see('explore.open', () => ({ field: 'degree' })),
  'GET /snapshots/{snapshot}/handles': see('explore.open'),
  'GET /snapshots/{snapshot}/matching': see('explore.open', () => ({ filter: '[]' })),

  'GET /snapshots/{snapshot}/groupings': see('explore.open'),
  'POST /snapshots/{snapshot}/groupings': change('analysis.make', () => ({ method: 'fiedler' })),
  'GET /groupings/{grouping}': see('explore.open'),
  'PATCH /groupings/{grouping}': change('analysis.make', () => ({ name: 'Walked' })),
  'GET /groupings/{grouping}/members': see('explore.open'),
  'GET /groupings/{grouping}/members.csv': see('export.tables'),
  'GET /groupings/{grouping}/compare': see('explore.open', (f) => ({ with: f.params.grouping! })),
  'GET /snapshots/{snapshot}/readings': see('explore.open'),
  'POST /snapshots/{snapshot}/readings': change('analysis.make', () => ({ attribute: 'Secret score' })),
  'GET /readings/{reading}': see('explore.open'),
  'GET /readings/{reading}/members': see('explore.open'),
  'GET /readings/{reading}/members.csv': see('export.tables'),

  'POST /readings/{reading}/cases': change('cases.open', () => ({ preview: true })),
  'GET /workspaces/{workspace}/cases': see('cases.read'),
  'GET /cases/{case}': see('cases.read'),
  'PATCH /cases/{case}': change('cases.work', () => ({ version: 99, priority: 'high' })),
  'POST /cases/{case}/notes': change('cases.work', () => ({ body: 'Asked how the swap went.' })),
  'POST /cases/{case}/decisions': change('cases.work', () => ({
    version: 99,
    decision: 'no-concern',
    reason: REASON,
  })),
  'POST /cases/{case}/reopen': change('cases.work', () => ({ version: 99, reason: REASON })),
};
