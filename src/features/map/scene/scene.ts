import { createNodeBorderProgram } from '@sigma/node-border';
import Sigma from 'sigma';
import { EdgeLineProgram, NodePointProgram } from 'sigma/rendering';
import type { CameraState, EdgeDisplayData, NodeDisplayData } from 'sigma/types';
import { readToken, type Rgb } from '@/lib/ramps';
import type { EdgeAttributes, MapGraph, NodeAttributes } from './graph';
import { RegionLayer } from './region-layer';
import type { Region } from './regions';

/** What the reducers look at; changed by the setters below, never written into the graph. */
interface Paint {
  colours: readonly string[];
  sizes: Float32Array;
  mask: Uint8Array | null;
  names: readonly string[] | null;
  selected: ReadonlySet<number>;
  focused: number | null;
  hovered: number | null;
  near: ReadonlySet<number>;
}

export interface SceneEvents {
  hover(ordinal: number | null, at: { x: number; y: number } | null): void;
  pick(ordinal: number | null, add: boolean): void;
  camera(state: { x: number; y: number; ratio: number }): void;
}

interface Inks {
  edge: string;
  edgeFaint: string;
  edgeNear: string;
  faded: string;
  outline: string;
  mark: string;
  ground: string;
  ink: string;
}

const mix = (a: Rgb, b: Rgb, share: number): string =>
  `rgb(${a.map((part, i) => Math.round(part * share + b[i]! * (1 - share))).join(',')})`;

function inksOf(style: CSSStyleDeclaration): Inks {
  const sheet = readToken(style, '--c-sheet');
  const tie = readToken(style, '--c-tie');
  return {
    edge: mix(tie, sheet, 0.34),
    edgeFaint: mix(tie, sheet, 0.08),
    edgeNear: mix(readToken(style, '--c-ink'), sheet, 0.85),
    faded: mix(readToken(style, '--c-line'), sheet, 0.55),
    outline: mix(readToken(style, '--c-node-edge'), sheet, 1),
    mark: mix(readToken(style, '--c-madder'), sheet, 1),
    ink: mix(readToken(style, '--c-ink'), sheet, 1),
    ground: mix(sheet, sheet, 1),
  };
}

type Drawn = Partial<NodeDisplayData> & { borderColor: string; borderSize: number };

const richPrograms = {
  nodeProgramClasses: {
    bordered: createNodeBorderProgram<NodeAttributes, EdgeAttributes>({
      borders: [
        { size: { attribute: 'borderSize', defaultValue: 0.14 }, color: { attribute: 'borderColor' } },
        { size: { fill: true }, color: { attribute: 'color' } },
      ],
    }),
  },
};

/** Points and lines one pixel wide: borders and feathered ties cost a software renderer seconds a frame on large networks. */
const plainPrograms = {
  nodeProgramClasses: { bordered: NodePointProgram<NodeAttributes, EdgeAttributes> },
  edgeProgramClasses: { line: EdgeLineProgram<NodeAttributes, EdgeAttributes> },
};

/** The WebGL picture: one sigma instance, its reducers, and the layer of group regions beneath. */
export class MapScene {
  readonly sigma: Sigma<NodeAttributes, EdgeAttributes>;
  private readonly regionLayer: RegionLayer;
  private readonly paint: Paint;
  private readonly large: boolean;
  private inks: Inks;

  constructor(
    private readonly container: HTMLElement,
    private readonly graph: MapGraph,
    sizes: Float32Array,
    events: SceneEvents,
  ) {
    const style = getComputedStyle(container);
    this.inks = inksOf(style);
    this.paint = {
      colours: [],
      sizes,
      mask: null,
      names: null,
      selected: new Set(),
      focused: null,
      hovered: null,
      near: new Set(),
    };
    this.large = graph.order > 20_000;
    this.sigma = new Sigma<NodeAttributes, EdgeAttributes>(graph, container, {
      allowInvalidContainer: true,
      defaultNodeType: 'bordered',
      ...(this.large ? plainPrograms : richPrograms),
      hideEdgesOnMove: graph.size > 20_000 || this.large,
      hideLabelsOnMove: this.large,
      labelFont: style.getPropertyValue('--font'),
      labelSize: 12,
      labelWeight: '600',
      // From afar the groups are named; members only once there is room between them.
      labelRenderedSizeThreshold: 11,
      labelDensity: 0.6,
      minCameraRatio: 0.02,
      maxCameraRatio: 4,
      stagePadding: 36,
      zIndex: true,
      defaultDrawNodeLabel: (context, data, settings) => this.drawLabel(context, data, settings),
      // Our own hover card says more than sigma's label box.
      defaultDrawNodeHover: () => undefined,
      nodeReducer: (key, data) => this.drawNode(Number(key), data),
      edgeReducer: (key, data) => this.drawEdge(key, data),
    });
    this.regionLayer = new RegionLayer(this.sigma, container);
    this.listen(events);
  }

  private listen(events: SceneEvents): void {
    this.sigma.on('enterNode', ({ node }) => {
      this.hover(Number(node));
      events.hover(Number(node), this.viewportOf(Number(node)));
    });
    this.sigma.on('leaveNode', () => {
      this.hover(null);
      events.hover(null, null);
    });
    this.sigma.on('clickNode', ({ node, event }) => {
      const { original } = event;
      events.pick(
        Number(node),
        'shiftKey' in original && (original.shiftKey || original.metaKey || original.ctrlKey),
      );
    });
    this.sigma.on('clickStage', () => events.pick(null, false));
    this.sigma.getCamera().on('updated', ({ x, y, ratio }: CameraState) => events.camera({ x, y, ratio }));
  }

  private drawNode(i: number, data: NodeAttributes): Drawn {
    const { sizes, mask, names, selected, focused, hovered, near } = this.paint;
    const out = mask !== null && mask[i] === 0;
    const marked = selected.has(i) || i === focused || i === hovered;
    return {
      x: data.x,
      y: data.y,
      size: sizes[i]! * (marked ? 1.7 : out ? 0.7 : 1),
      color: this.fillOf(i, marked, out),
      borderColor: selected.has(i)
        ? this.inks.mark
        : marked
          ? this.inks.ink
          : out
            ? this.inks.faded
            : this.inks.outline,
      borderSize: marked ? 0.34 : 0.14,
      label: names?.[i] ?? null,
      forceLabel: marked,
      highlighted: false,
      hidden: false,
      zIndex: marked ? 3 : near.has(i) ? 2 : out ? 0 : 1,
    };
  }

  private fillOf(i: number, marked: boolean, out: boolean): string {
    const { colours, selected } = this.paint;
    // A point has no border to be marked by.
    if (marked && this.large) return selected.has(i) ? this.inks.mark : this.inks.ink;
    return out && !marked ? this.inks.faded : (colours[i] ?? this.inks.faded);
  }

  private drawEdge(key: string, data: EdgeAttributes): Partial<EdgeDisplayData> {
    const { mask, focused, hovered, near } = this.paint;
    const [a, b] = this.graph.extremities(key).map(Number) as [number, number];
    const centre = hovered ?? focused;
    if (centre !== null && near.size > 0 && (a === centre || b === centre))
      return { size: Math.min(3, 1 + Math.log1p(data.weight) * 0.5), color: this.inks.edgeNear, zIndex: 2 };
    const out = mask !== null && (mask[a] === 0 || mask[b] === 0);
    return { size: 0.5, color: out ? this.inks.edgeFaint : this.inks.edge, zIndex: out ? 0 : 1 };
  }

  /** A name beside its member, with a rim of the ground's colour so that it reads on top of others. */
  private drawLabel(
    context: CanvasRenderingContext2D,
    data: Pick<NodeDisplayData, 'x' | 'y' | 'size'> & { label: string | null },
    settings: { labelSize: number; labelFont: string; labelWeight: string },
  ): void {
    if (!data.label) return;
    const x = data.x + data.size + 4;
    const y = data.y + settings.labelSize / 3;
    context.font = `${settings.labelWeight} ${settings.labelSize}px ${settings.labelFont}`;
    context.lineJoin = 'round';
    context.lineWidth = 4;
    context.strokeStyle = this.inks.ground;
    context.strokeText(data.label, x, y);
    context.fillStyle = this.inks.ink;
    context.fillText(data.label, x, y);
  }

  /** Redraws only what the pointer left and reached: a full pass over 100,000 members takes longer than a frame. */
  private hover(ordinal: number | null): void {
    const left = this.paint.hovered ?? this.paint.focused;
    const touched = new Set([left, ...this.paint.near]);
    this.paint.hovered = ordinal;
    this.markNear();
    const reached = ordinal ?? this.paint.focused;
    for (const i of [reached, ...this.paint.near]) touched.add(i);
    const keys = (members: Iterable<number | null>): string[] =>
      [...members].filter((i) => i !== null).map(String);
    this.sigma.refresh({
      partialGraph: {
        nodes: keys(touched),
        edges: keys(new Set([left, reached])).flatMap((key) => this.graph.edges(key)),
      },
      skipIndexation: true,
    });
  }

  private markNear(): void {
    const centre = this.paint.hovered ?? this.paint.focused;
    this.paint.near = centre === null ? new Set() : new Set(this.graph.neighbors(String(centre)).map(Number));
  }

  private change(part: Partial<Paint>): void {
    Object.assign(this.paint, part);
    this.markNear();
    this.sigma.refresh({ skipIndexation: true });
  }

  setColours(colours: readonly string[]): void {
    this.change({ colours });
  }
  setSizes(sizes: Float32Array): void {
    this.paint.sizes = sizes;
    this.sigma.refresh();
  }
  setMask(mask: Uint8Array | null): void {
    this.change({ mask });
  }
  setNames(names: readonly string[]): void {
    this.change({ names });
  }
  setSelected(selected: ReadonlySet<number>): void {
    this.change({ selected });
  }
  /** Marks a member as walked to by keyboard or opened in the panel, with their ties. */
  setFocused(focused: number | null): void {
    this.change({ focused });
  }
  setRegions(regions: readonly Region[], names: ReadonlyMap<number, string>): void {
    this.regionLayer.set(regions, names);
  }

  /** Reads the tokens again after a change of theme. */
  retheme(): void {
    this.inks = inksOf(getComputedStyle(this.container));
    this.sigma.refresh({ skipIndexation: true });
    this.regionLayer.draw();
  }

  viewportOf(ordinal: number): { x: number; y: number } {
    const { x, y } = this.graph.getNodeAttributes(String(ordinal));
    return this.sigma.graphToViewport({ x, y });
  }

  /** Moves the camera; at once where reduced motion is asked for. */
  private move(state: Partial<CameraState>): void {
    const still = matchMedia('(prefers-reduced-motion: reduce)').matches;
    const camera = this.sigma.getCamera();
    if (still) camera.setState({ ...camera.getState(), ...state });
    else void camera.animate(state, { duration: 240 });
  }
  zoom(factor: number): void {
    this.move({
      ratio: this.sigma.getCamera().getBoundedRatio(this.sigma.getCamera().getState().ratio * factor),
    });
  }
  fit(): void {
    this.move({ x: 0.5, y: 0.5, ratio: 1, angle: 0 });
  }
  lookAt(ordinal: number): void {
    const data = this.sigma.getNodeDisplayData(String(ordinal));
    if (data)
      this.move({ x: data.x, y: data.y, ratio: Math.min(this.sigma.getCamera().getState().ratio, 0.5) });
  }
  setCamera(state: { x: number; y: number; ratio: number }): void {
    this.sigma.getCamera().setState({ ...state, angle: 0 });
  }

  destroy(): void {
    this.regionLayer.destroy();
    this.sigma.kill();
  }
}
