/**
 * The compact binary form of a network, for the Map. Little-endian, every part aligned to four bytes:
 *
 * | bytes | what |
 * | --- | --- |
 * | 4 | the letters THRM |
 * | 4 | uint32 version, 1 |
 * | 4, 4 | uint32 members n, uint32 ties m |
 * | 4n, 4n | float32 x, float32 y |
 * | 4n | int32 number of ties of each member |
 * | 4n | float32 strength of each member |
 * | 4n | int32 component of each member |
 * | 4m, 4m | int32 source, int32 target of each tie, by place in the member order, source < target |
 * | 4m | float32 weight of each tie |
 */
export interface DecodedNetwork {
  readonly n: number;
  readonly ties: number;
  readonly x: Float32Array;
  readonly y: Float32Array;
  readonly degree: Int32Array;
  readonly strength: Float32Array;
  readonly component: Int32Array;
  readonly sources: Int32Array;
  readonly targets: Int32Array;
  readonly weights: Float32Array;
}

const MAGIC = 0x4d524854;
const VERSION = 1;
const HEAD = 16;

export const NETWORK_TYPE = 'application/vnd.thrum.network';

/** Views into `buffer`; nothing is copied. @throws Error when it is not a network of a version we know */
export function decodeNetwork(buffer: ArrayBuffer): DecodedNetwork {
  const head = new Uint32Array(buffer, 0, 4);
  const [magic, version, n, ties] = head as unknown as [number, number, number, number];
  if (magic !== MAGIC || version !== VERSION)
    throw new Error('This is not a network of a version that this page knows.');
  let at = HEAD;
  const take = (length: number): number => {
    const start = at;
    at += 4 * length;
    return start;
  };
  return {
    n,
    ties,
    x: new Float32Array(buffer, take(n), n),
    y: new Float32Array(buffer, take(n), n),
    degree: new Int32Array(buffer, take(n), n),
    strength: new Float32Array(buffer, take(n), n),
    component: new Int32Array(buffer, take(n), n),
    sources: new Int32Array(buffer, take(ties), ties),
    targets: new Int32Array(buffer, take(ties), ties),
    weights: new Float32Array(buffer, take(ties), ties),
  };
}

/** The parts of the binary form, in order, ready to be written one after the other. */
export function encodeNetwork(network: DecodedNetwork): ArrayBuffer {
  const { n, ties } = network;
  const buffer = new ArrayBuffer(HEAD + 4 * (5 * n + 3 * ties));
  new Uint32Array(buffer, 0, 4).set([MAGIC, VERSION, n, ties]);
  const into = decodeNetwork(buffer);
  for (const part of ['x', 'y', 'degree', 'strength', 'component', 'sources', 'targets', 'weights'] as const)
    (into[part] as Float32Array).set(network[part]);
  return buffer;
}
