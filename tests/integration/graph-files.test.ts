import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Graph from 'graphology';
import gexf from 'graphology-gexf';
import graphml from 'graphology-graphml';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { Actor } from '@/lib/actor';
import { escapeXml } from '@/features/network/graph-files';
import { makeCommunityWorld, settleCommunity, type CommunityWorld } from '../factories/community-world';
import { runQueued, upload } from '../factories/imports';
import { call } from './call';

/** Read back by independent readers: graphology's, and networkx where it is present (Debian's python3-networkx). */
let world: CommunityWorld;
let actor: Actor;
let texts: { gexf: string; graphml: string };

const ties = 'source,target,weight,kind\nann,bob,1.5,trade\nbob,"c<&>""é",0.1,\nann,dora,1e-7,reply\n';
const members =
  'id,name,score,town\nann,Ann,1.25,Ely\nbob,"Bob ""B"" & <Co>",-3,\n"c<&>""é",,,Över\ndora,D,0.1,Ely\n';

beforeAll(async () => {
  world = await makeCommunityWorld();
  actor = world.actor;
  const { job } = (await (await upload(actor, world.communityId, { ties, members })).json()) as {
    job: { id: string };
  };
  const snapshot = (await runQueued(job.id)).result!.id;
  const { GET: getGexf } = await import('@/pages/api/v1/snapshots/[snapshot]/network.gexf');
  const { GET: getGraphml } = await import('@/pages/api/v1/snapshots/[snapshot]/network.graphml');
  texts = {
    gexf: await (await call(getGexf, { actor, params: { snapshot } })).text(),
    graphml: await (await call(getGraphml, { actor, params: { snapshot } })).text(),
  };
});
afterAll(() => world.close());

const WEIGHTS = [
  ['ann', 'bob', 1.5],
  ['bob', 'c<&>"é', 0.1],
  ['ann', 'dora', 1e-7],
] as const;

describe.each(['gexf', 'graphml'] as const)('%s, read by graphology', (format) => {
  const read = () =>
    format === 'gexf' ? gexf.parse(Graph, texts.gexf) : graphml.parse(Graph, texts.graphml);

  test('every member with every value, every tie with its weight to the last digit', () => {
    const graph = read();
    expect(graph.type).toBe('undirected');
    expect([graph.order, graph.size]).toEqual([4, 3]);
    for (const [from, to, weight] of WEIGHTS)
      expect(Number(graph.getEdgeAttribute(graph.edge(from, to), 'weight'))).toBe(weight);
    expect(graph.getEdgeAttribute(graph.edge('ann', 'bob'), 'kind')).toBe('trade');
    expect(graph.getNodeAttributes('bob')).toMatchObject({ label: 'Bob "B" & <Co>', score: -3 });
    expect(graph.getNodeAttributes('ann')).toMatchObject({ score: 1.25, town: 'Ely' });
    expect(graph.getNodeAttributes('c<&>"é')).toMatchObject({ town: 'Över' });
    expect(graph.getNodeAttribute('c<&>"é', 'score')).toBeUndefined();
  });
});

test('networkx reads the same from GraphML, where it is present', () => {
  if (spawnSync('python3', ['-c', 'import networkx']).status !== 0) return;
  const folder = mkdtempSync(join(tmpdir(), 'thrum-graph-'));
  const script = `
import json, sys, networkx as nx
g = nx.read_graphml(sys.argv[2])
print(json.dumps({
  "nodes": sorted(g.nodes),
  "edges": sorted([sorted([u, v]) + [d["weight"]] for u, v, d in g.edges(data=True)]),
  "score": g.nodes["ann"]["score"],
}))`;
  writeFileSync(join(folder, 'a.gexf'), texts.gexf);
  writeFileSync(join(folder, 'a.graphml'), texts.graphml);
  const { stdout, stderr } = spawnSync(
    'python3',
    ['-c', script, join(folder, 'a.gexf'), join(folder, 'a.graphml')],
    {
      encoding: 'utf8',
    },
  );
  rmSync(folder, { recursive: true });
  expect(stderr).toBe('');
  expect(JSON.parse(stdout)).toEqual({
    nodes: ['ann', 'bob', 'c<&>"é', 'dora'],
    edges: [
      ['ann', 'bob', 1.5],
      ['ann', 'dora', 1e-7],
      ['bob', 'c<&>"é', 0.1],
    ],
    score: 1.25,
  });
});

test('the karate club of Zachary (1977) comes back with its 78 ties', async () => {
  const { actor: own, communityId } = await settleCommunity();
  const file = readFileSync('tests/reference/data/karate/edges.csv', 'utf8');
  const { job } = (await (await upload(own, communityId, { ties: file })).json()) as { job: { id: string } };
  const snapshot = (await runQueued(job.id)).result!.id;
  const { GET } = await import('@/pages/api/v1/snapshots/[snapshot]/network.gexf');
  const graph = gexf.parse(Graph, await (await call(GET, { actor: own, params: { snapshot } })).text());
  expect([graph.order, graph.size]).toEqual([34, 78]);
});

test('what XML has no form for is left out', () => {
  expect(escapeXml('a\u0000b\u001fc\ud800d\u{1f41d}<"\n')).toBe('abcd\u{1f41d}&lt;&quot;&#10;');
});
