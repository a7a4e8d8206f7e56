import type { Action } from '@/features/workspaces';
import type { Colour, ViewState } from './state';
import type { SavedView } from './views';

export interface ExploreAttribute {
  readonly id: string;
  readonly name: string;
  readonly type: 'number' | 'label';
}

export interface ExploreReading {
  readonly id: string;
  readonly attribute: string;
  readonly attributeId: string;
  readonly createdAt: string;
}

export interface ExploreGroup {
  readonly index: number;
  readonly letter: string;
  readonly name: string | null;
  readonly size: number;
  readonly islet: boolean;
}

export interface ExploreGrouping {
  readonly id: string;
  readonly name: string;
  readonly groups: readonly ExploreGroup[];
}

/** Everything that the page hands to the Map and the Members table; the rest is fetched as it is needed. */
export interface ExploreProps {
  readonly base: string;
  readonly communityId: string;
  readonly snapshot: { id: string; members: number; ties: number; takenOn: string };
  readonly attributes: readonly ExploreAttribute[];
  readonly readings: readonly ExploreReading[];
  readonly groupings: readonly ExploreGrouping[];
  readonly abilities: readonly Action[];
  readonly initial: ViewState;
  readonly view: SavedView | null;
}

/** `attribute:<id>` and so on: the field that a colour shows, or null for plain. */
export function colourField({ by, of }: Colour): string | null {
  return of && by !== 'plain' ? `${by}:${of}` : null;
}

/** How a colour is called in the menus and over the strip. */
export function colourTitle(props: ExploreProps, colour: Colour): string {
  const reading = props.readings.find((one) => one.id === colour.of);
  switch (colour.by) {
    case 'attribute':
      return `${props.attributes.find((one) => one.id === colour.of)?.name ?? 'Attribute'}, as recorded`;
    case 'smoothed':
      return `${reading?.attribute ?? 'Score'}, smoothed`;
    case 'departure':
      return `${reading?.attribute ?? 'Score'}, departure`;
    case 'group':
      return `Groups, ${props.groupings.find((one) => one.id === colour.of)?.name ?? ''}`;
    default:
      return 'Plain';
  }
}
