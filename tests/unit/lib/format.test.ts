import { describe, expect, it } from 'vitest';
import {
  formatAgo,
  formatChance,
  formatCount,
  formatDate,
  formatDeparture,
  formatNumber,
  formatPercent,
  initialsOf,
} from '@/lib/format';
import { groupColour, groupIndex, groupLetter } from '@/lib/groups';
import { divergingStep, parseRgb, readRamp, sequentialStep } from '@/lib/ramps';

describe('numbers in words', () => {
  it('groups thousands and uses a true minus sign', () => {
    expect(formatNumber(1264)).toBe('1,264');
    expect(formatNumber(-1.5, 2)).toBe('\u22121.50');
    expect(formatNumber(-0.001, 2)).toBe('0.00');
    expect(formatNumber(Number.NaN)).toBe('–');
  });
  it('gives departures a sign, except at zero', () => {
    expect(formatDeparture(1.42)).toBe('+1.42');
    expect(formatDeparture(-1.75)).toBe('\u22121.75');
    expect(formatDeparture(0.001)).toBe('0.00');
    expect(formatDeparture(null)).toBe('–');
  });
  it('never writes a chance as certain', () => {
    expect(formatChance(0.004)).toBe('under 1%');
    expect(formatChance(0.01)).toBe('1%');
    expect(formatChance(0.999)).toBe('over 99%');
    expect(formatPercent(0.634)).toBe('63%');
  });
  it('writes dates in UTC and counts with their noun', () => {
    expect(formatDate('2026-11-28')).toBe('28 Nov 2026');
    expect(formatDate('2026-09-01T00:30:00Z', 'short')).toBe('1 Sep');
    expect(formatDate('2026-11-28T14:02:00Z', 'time')).toBe('28 Nov, 14:02');
    expect(formatAgo('2026-11-28T14:02:00Z', new Date('2026-11-28T14:42:30Z'))).toBe('40 min ago');
    expect(formatCount(1, 'member')).toBe('1 member');
    expect(formatCount(1264, 'member')).toBe('1,264 members');
    expect(initialsOf('Orla Tennant-Rye')).toBe('OT');
  });
});

describe('groups', () => {
  it('doubles the letter past ten and comes back', () => {
    expect([0, 7, 9, 10, 19, 20].map(groupLetter)).toEqual(['A', 'H', 'J', 'AA', 'JJ', 'AAA']);
    for (let i = 0; i < 45; i++) expect(groupIndex(groupLetter(i))).toBe(i);
    expect(groupIndex('AB')).toBeNull();
    expect(groupColour('CC')).toEqual({ fill: '--g-c', ink: '--gi-c' });
  });
});

describe('ramps', () => {
  it('puts the centre in the middle step and clamps the ends', () => {
    expect([-9, -1, 0, 1, 9].map((v) => divergingStep(v, 0, 1))).toEqual([1, 1, 5, 9, 9]);
    expect([0, 0.5, 1].map((v) => sequentialStep(v, 0, 1))).toEqual([1, 4, 7]);
    expect(sequentialStep(3, 3, 3)).toBe(1);
  });
  it('reads colours from a computed style', () => {
    expect(parseRgb(' #EDE7DA')).toEqual([237, 231, 218]);
    expect(parseRgb('rgb(1, 2, 3)')).toEqual([1, 2, 3]);
    expect(readRamp({ getPropertyValue: () => '#000102' }, 'sequential')).toHaveLength(7);
  });
});
