import { IconButton, SegmentedControl, Select, type Option } from '@/components/ui';
import type { ViewState } from '@/features/views';
import { colourTitle, type ExploreProps } from '@/features/views';
import { SavedViews } from '@/features/views/ui';
import type { StateControl } from '@/features/views/ui';

type Colour = ViewState['colour'];
const keyOf = (colour: Colour): string => `${colour.by}|${colour.of ?? ''}`;
const colourOf = (key: string): Colour => {
  const [by, of] = key.split('|') as [Colour['by'], string];
  return { by, of: of || null };
};

/** Every way to colour this snapshot, in the order of the menu. */
function colourOptions(props: ExploreProps): Option[] {
  const colours: Colour[] = [
    ...props.groupings.map((one): Colour => ({ by: 'group', of: one.id })),
    ...props.attributes
      .filter((one) => one.type === 'number')
      .map((one): Colour => ({ by: 'attribute', of: one.id })),
    ...props.readings.flatMap((one): Colour[] => [
      { by: 'smoothed', of: one.id },
      { by: 'departure', of: one.id },
    ]),
    { by: 'plain', of: null },
  ];
  return colours.map((colour) => ({ id: keyOf(colour), label: colourTitle(props, colour) }));
}

/** Colour, size and seams of the picture; map or list; saved views; undo and redo. */
export function MapTools({ props, control }: { props: ExploreProps; control: StateControl }) {
  const { state, set } = control;
  return (
    <div className="tools">
      <Select
        label="Colour"
        labelPlace="inside"
        size="small"
        options={colourOptions(props)}
        value={keyOf(state.colour)}
        onChange={(key) => set({ colour: colourOf(key) })}
      />
      <span className="hide-m">
        <Select
          label="Size"
          labelPlace="inside"
          size="small"
          options={[
            { id: 'degree', label: 'Ties' },
            { id: 'strength', label: 'Tie strength' },
            { id: 'same', label: 'All the same' },
          ]}
          value={state.size}
          onChange={(size) => set({ size })}
        />
      </span>
      {props.groupings.length > 0 && (
        <Select
          label="Seams"
          labelPlace="inside"
          size="small"
          options={[
            { id: '', label: 'None' },
            ...props.groupings.map(({ id, name }) => ({ id, label: name })),
          ]}
          value={state.seams ?? ''}
          onChange={(id) => set({ seams: id || null })}
        />
      )}
      <IconButton
        icon="undo"
        size="small"
        kind="quiet"
        label="Undo"
        disabled={!control.canUndo}
        onClick={control.undo}
      />
      <span className="grow" />
      <SegmentedControl
        label="Show as"
        options={[
          { value: 'map', label: 'Map' },
          { value: 'list', label: 'List' },
        ]}
        value={state.display}
        onChange={(display) => set({ display })}
      />
      <SavedViews props={props} control={control} />
    </div>
  );
}
