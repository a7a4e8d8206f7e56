import { describe, expect, it } from 'vitest';
import { binValues, edgesOf, moveEdge, nearestEdge, shiftRange } from '@/components/charts/bins';
import { stackLevels } from '@/components/charts/stack';
import { ticksFor } from '@/components/charts/ticks';
import { readNumber } from '@/components/ui/NumberInput';
import { splitTabs, type NavItem } from '@/layouts/shell.types';

describe('bins of a strip', () => {
  const { bins, missing } = binValues([1, 1.9, 2, 5, 9, Number.NaN], 4, [1, 5]);
  it('counts every value once and missing ones apart', () => {
    expect(bins.map((bin) => bin.count)).toEqual([2, 1, 0, 2]);
    expect(missing).toBe(1);
    expect(edgesOf(bins)).toEqual([1, 2, 3, 4, 5]);
  });
  it('finds edges and keeps at least one bin inside', () => {
    expect(nearestEdge(edgesOf(bins), 3.4)).toBe(2);
    expect(moveEdge([1, 3], 'low', 10, 4)).toEqual([2, 3]);
    expect(moveEdge([1, 3], 'high', -10, 4)).toEqual([1, 2]);
    expect(moveEdge([1, 3], 'low', -10, 4)).toEqual([0, 3]);
  });
  it('moves a range without changing its width', () => {
    expect(shiftRange([1, 3], 10, 4)).toEqual([2, 4]);
    expect(shiftRange([1, 3], -1, 4)).toEqual([0, 2]);
  });
});

describe('dots of a strip plot', () => {
  it('never overlap on one level', () => {
    const places = Array.from({ length: 60 }, (_, i) => (i * 37) % 101);
    const levels = stackLevels(places, 12);
    for (let a = 0; a < 60; a++)
      for (let b = 0; b < a; b++)
        if (levels[a] === levels[b])
          expect(Math.abs((places[a] ?? 0) - (places[b] ?? 0))).toBeGreaterThanOrEqual(12);
  });
});

describe('ticks', () => {
  it('leave room for their words at any width', () => {
    for (let width = 200; width < 1400; width += 7) {
      const ticks = ticksFor([1, 5], width, 64);
      expect((ticks.length - 1) * 64).toBeLessThanOrEqual(Math.max(width, 192));
    }
    expect(ticksFor([0, 1], 330, 64).map((tick) => tick.label)).toEqual([
      '0.0',
      '0.2',
      '0.4',
      '0.6',
      '0.8',
      '1.0',
    ]);
  });
});

describe('numbers as typed', () => {
  it('reads thousands, the true minus and decimals, and refuses the rest', () => {
    expect(['1,264', '\u22122.5', ' 3 ', '', '.5'].map(readNumber)).toEqual([1264, -2.5, 3, null, 0.5]);
    expect(['1,2', 'abc', '--1', '1e'].map(readNumber)).toEqual([
      Number.NaN,
      Number.NaN,
      Number.NaN,
      Number.NaN,
    ]);
  });
});

describe('tabs at the foot of a phone', () => {
  it('lose no place', () => {
    const nav = ['brief', 'map', 'members', 'groups', 'cases', 'imports'].map((key): NavItem => ({
      key,
      label: key,
      href: `/${key}`,
      icon: 'brief',
    }));
    const { tabs, more } = splitTabs(nav);
    expect(tabs.map((item) => item.key)).toEqual(['brief', 'map', 'members', 'cases']);
    expect([...tabs, ...more]).toHaveLength(nav.length);
  });
});
