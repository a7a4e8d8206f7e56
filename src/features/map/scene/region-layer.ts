import type Sigma from 'sigma';
import { groupColour, groupLetter } from '@/lib/groups';
import type { EdgeAttributes, NodeAttributes } from './graph';
import type { Region } from './regions';

const STITCH = [5, 4];

/** Group regions with stitched seams on a canvas beneath the network, and their names above it. */
export class RegionLayer {
  private readonly canvas = document.createElement('canvas');
  private readonly labels = document.createElement('div');
  private regions: readonly Region[] = [];
  private readonly redraw = (): void => this.draw();

  constructor(
    private readonly sigma: Sigma<NodeAttributes, EdgeAttributes>,
    private readonly container: HTMLElement,
  ) {
    this.canvas.className = 'map-regions';
    this.canvas.setAttribute('aria-hidden', 'true');
    this.labels.className = 'map-labels';
    this.labels.setAttribute('aria-hidden', 'true');
    container.prepend(this.canvas);
    container.append(this.labels);
    sigma.on('afterRender', this.redraw);
  }

  set(regions: readonly Region[], names: ReadonlyMap<number, string>): void {
    this.regions = regions;
    this.labels.replaceChildren(
      ...regions.map((region) => {
        const letter = groupLetter(region.group);
        const colour = groupColour(letter)!;
        const label = document.createElement('span');
        label.className = 'glabel';
        const tag = document.createElement('span');
        tag.className = 'tag';
        tag.style.setProperty('--tg', `var(${colour.fill})`);
        tag.style.setProperty('--ti', `var(${colour.ink})`);
        tag.textContent = letter;
        label.append(tag, names.get(region.group) ?? '');
        return label;
      }),
    );
    this.draw();
  }

  draw(): void {
    const { width, height } = this.sigma.getDimensions();
    const ratio = devicePixelRatio || 1;
    if (this.canvas.width !== width * ratio || this.canvas.height !== height * ratio) {
      this.canvas.width = width * ratio;
      this.canvas.height = height * ratio;
    }
    const context = this.canvas.getContext('2d');
    if (!context) return;
    context.setTransform(ratio, 0, 0, ratio, 0, 0);
    context.clearRect(0, 0, width, height);
    const style = getComputedStyle(this.container);
    const seam = style.getPropertyValue('--c-tie-seam');
    for (const region of this.regions) {
      const path = new Path2D();
      for (const ring of region.rings) {
        ring.forEach(([x, y], i) => {
          const at = this.sigma.graphToViewport({ x, y });
          if (i === 0) path.moveTo(at.x, at.y);
          else path.lineTo(at.x, at.y);
        });
        path.closePath();
      }
      context.fillStyle = style.getPropertyValue(groupColour(groupLetter(region.group))!.fill);
      context.globalAlpha = 0.1;
      context.fill(path, 'evenodd');
      context.globalAlpha = 1;
      context.strokeStyle = seam;
      context.lineWidth = 1.4;
      context.setLineDash(STITCH);
      context.stroke(path);
    }
    this.placeLabels(width, height);
  }

  private placeLabels(width: number, height: number): void {
    const taken: { x: number; y: number; w: number }[] = [];
    const close = this.sigma.getCamera().getState().ratio < 0.35;
    [...this.labels.children].forEach((child, i) => {
      const label = child as HTMLElement;
      const region = this.regions[i]!;
      const top = region.rings
        .flat()
        .reduce<readonly [number, number] | null>(
          (best, point) => (best === null || point[1] > best[1] ? point : best),
          null,
        );
      const at = this.sigma.graphToViewport({ x: (top ?? region.label)[0], y: (top ?? region.label)[1] });
      const w = label.offsetWidth || 90;
      const free = !taken.some(
        (other) => Math.abs(other.y - at.y) < 26 && Math.abs(other.x - at.x) < (other.w + w) / 2,
      );
      const inside = at.x > -40 && at.y > 0 && at.x < width + 40 && at.y < height;
      label.hidden = close || !free || !inside;
      if (!label.hidden) taken.push({ x: at.x, y: at.y, w });
      label.style.transform = `translate(${Math.round(at.x - w / 2)}px, ${Math.round(at.y - 14)}px)`;
    });
  }

  destroy(): void {
    this.sigma.off('afterRender', this.redraw);
    this.canvas.remove();
    this.labels.remove();
  }
}
