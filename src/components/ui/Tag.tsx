import type { CSSProperties } from 'react';
import { groupColour } from '@/lib/groups';
import { cx } from './classes';

export interface TagProps {
  /** A to J, doubled past ten (AA). Anything else is drawn plain. */
  letter: string;
  /** 17, 20 or 30 px. */
  size?: 'small' | 'default' | 'large';
  /** Full name, shown as a title and read out in place of the letter. */
  name?: string;
}

/** The inline style that gives an element a group's fill and ink (`--tg`, `--ti`). */
export function tagStyle(letter: string): CSSProperties {
  const colour = groupColour(letter);
  return (colour ? { '--tg': `var(${colour.fill})`, '--ti': `var(${colour.ink})` } : {}) as CSSProperties;
}

/** The square woven label of a group. */
export function Tag({ letter, size = 'default', name }: TagProps) {
  const classes = cx('tag', size === 'small' && 'xs', size === 'large' && 'l', letter.length > 1 && 'pair');
  return (
    <span className={classes} style={tagStyle(letter)} title={name}>
      {letter}
    </span>
  );
}
