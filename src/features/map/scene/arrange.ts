import { inferSettings } from 'graphology-layout-forceatlas2';
import FA2Layout from 'graphology-layout-forceatlas2/worker';
import type { MapGraph } from './graph';

/** The force layout in a worker of its own, so that the page stays quick while members settle. */
export class Arranger {
  private readonly layout: FA2Layout;
  constructor(graph: MapGraph) {
    this.layout = new FA2Layout(graph, {
      settings: { ...inferSettings(graph), barnesHutOptimize: graph.order > 1_000, slowDown: 6 },
    });
  }
  get running(): boolean {
    return this.layout.isRunning();
  }
  start(): void {
    this.layout.start();
  }
  pause(): void {
    this.layout.stop();
  }
  destroy(): void {
    this.layout.kill();
  }
}
