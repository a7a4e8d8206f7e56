import { useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useState } from 'react';
import type { DecodedNetwork } from '@/features/network';
import type { ViewState } from '@/features/views';
import { onThemeChange } from '@/lib/theme';
import { columnQuery, matchingQuery } from '../data';
import { colourField, colourTitle, type ExploreProps } from '@/features/views';
import { binsOf, coloursOf, scaleOf, type Scale } from '../scene/paint';
import { regionsOf, type Region } from '../scene/regions';
import { sizesOf } from '../scene/graph';
import type { Bin } from '@/components/charts/bins';

/** What the picture shows for a state: colours, sizes, who passes the filters, regions, and the strip. */
export interface Picture {
  readonly colours: readonly string[];
  readonly sizes: Float32Array;
  readonly mask: Uint8Array | null;
  readonly shown: number;
  readonly scale: Scale;
  readonly regions: readonly Region[];
  /** Field that the strip counts and brushes. */
  readonly stripField: string | null;
  readonly title: string;
  readonly strip: { bins: Bin[]; missing: number } | null;
  readonly pending: boolean;
}

/** Counts up whenever the theme changes, so that colours are read again. */
function useTheme(): number {
  const [count, setCount] = useState(0);
  useEffect(() => onThemeChange(() => setCount((now) => now + 1)), []);
  return count;
}

export function usePicture(
  props: ExploreProps,
  state: ViewState,
  network: DecodedNetwork | undefined,
  viewId?: string,
): Picture {
  const theme = useTheme();
  const { id } = props.snapshot;
  const field = colourField(state.colour);
  const colour = useQuery(columnQuery(id, field, viewId));
  const seams = useQuery(columnQuery(id, state.seams ? `group:${state.seams}` : null, viewId));
  const matching = useQuery(matchingQuery(id, state.filters, viewId));
  // Colouring by group keeps the strip of the first attribute, stacked by group.
  const byGroup = state.colour.by === 'group';
  const first = props.attributes.find((one) => one.type === 'number');
  const stripField = byGroup || !field ? (first ? `attribute:${first.id}` : 'degree') : field;
  const stripColumn = useQuery(columnQuery(id, stripField, viewId));

  const values = colour.data?.values ?? null;
  const scale = useMemo(() => scaleOf(state.colour.by, values), [state.colour.by, values]);
  const colours = useMemo(() => {
    // The theme is not an argument but what the tokens are read from.
    void theme;
    return network ? coloursOf(getComputedStyle(document.documentElement), scale, values, network.n) : [];
  }, [network, scale, values, theme]);
  const sizes = useMemo(
    () => (network ? sizesOf(network, state.size) : new Float32Array()),
    [network, state.size],
  );
  const groups = seams.data?.values ?? null;
  const regions = useMemo(
    () => (network && groups ? regionsOf(network.x, network.y, groups) : []),
    [network, groups],
  );
  const mask = state.filters.length > 0 ? (matching.data ?? null) : null;
  const shown = useMemo(
    () => mask?.reduce((sum, bit) => sum + bit, 0) ?? props.snapshot.members,
    [mask, props.snapshot.members],
  );
  const stripValues = stripColumn.data?.values ?? null;
  const strip = useMemo(() => {
    if (!stripValues) return null;
    const own = stripField === field ? scale : { ...scaleOf('plain', stripValues), kind: 'plain' as const };
    return binsOf(own, stripValues, byGroup ? values : null);
  }, [stripValues, stripField, field, scale, byGroup, values]);
  const title = stripField === field ? colourTitle(props, state.colour) : (first?.name ?? 'Ties');
  return {
    colours,
    sizes,
    mask,
    shown,
    scale,
    regions,
    stripField,
    title,
    strip,
    pending: colour.isLoading || matching.isFetching,
  };
}
