import { describe, expect, test } from 'vitest';
import { headline, lead, type BriefFacts } from '@/features/brief';

const bare: BriefFacts = {
  members: 1000,
  ties: 5000,
  components: 1,
  largestComponent: 1000,
  weakest: null,
  mostShared: null,
};
const words = (facts: Partial<BriefFacts>): string => lead({ ...bare, ...facts }).join(' ');

describe('what the brief says never goes beyond its numbers', () => {
  test('with nothing made yet it says so', () => {
    expect(headline(bare)).toBe('One community, not yet read.');
    expect(words({})).toContain('No grouping has been made yet');
    expect(words({})).toContain('No reading has been taken yet');
  });

  test('parts are spoken of only when there are parts', () => {
    expect(words({})).not.toContain('smaller part');
    expect(words({ components: 3, largestComponent: 950 })).toContain('95% of the members are joined');
    expect(words({ components: 3, largestComponent: 950 })).toContain('2 smaller parts');
    expect(headline({ ...bare, components: 3 })).toBe('A community in parts.');
  });

  test('a seam is called thin only below a tenth', () => {
    const at = (leaving: number) => headline({ ...bare, weakest: { name: 'Bean Keepers', leaving } });
    expect(at(0.099)).toBe('Thinnest at the edge of Bean Keepers.');
    expect(at(0.1)).toBe('Groups that reach into one another.');
  });

  test('what stays inside is the complement of what leaves', () => {
    expect(words({ weakest: { name: 'Bean Keepers', leaving: 0.07 } })).toContain(
      '93% stays inside the group',
    );
  });

  test('an attribute that neighbours hardly predict is not called shared', () => {
    const at = (explained: number) => ({ mostShared: { attribute: 'Helpfulness', explained } });
    expect(words(at(0.04))).not.toContain('Helpfulness');
    expect(words(at(0.41))).toContain('Neighbours predict 41% of the differences in Helpfulness');
    expect(headline({ ...bare, ...at(0.29) })).not.toContain('Helpfulness');
    expect(headline({ ...bare, ...at(0.3) })).toBe('Helpfulness runs along ties.');
  });
});
