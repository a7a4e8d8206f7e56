import { Checkbox, IconButton, PopoverButton } from '@/components/ui';
import type { ExploreProps } from '@/features/views';
import { fieldTitle, type StateControl } from '@/features/views/ui';
import { columnChoices, shownColumns } from './columns';

/** Chooses and orders columns. */
export function ColumnsButton({ props, control }: { props: ExploreProps; control: StateControl }) {
  const { state, set } = control;
  const shown = shownColumns(props, state);
  const hidden = columnChoices(props).filter(({ field }) => !shown.includes(field));
  const move = (index: number, by: number): void => {
    const next = [...shown];
    const [held] = next.splice(index, 1);
    next.splice(index + by, 0, held!);
    set({ columns: next });
  };
  return (
    <PopoverButton
      trigger="Columns"
      icon="columns"
      size="small"
      label="Columns"
      placement="bottom end"
      width={280}
    >
      <div className="row sp">
        <b>Columns</b>
        <button type="button" className="linkish small" onClick={() => set({ columns: [] })}>
          Reset
        </button>
      </div>
      <ul className="column-list">
        {shown.map((field, index) => (
          <li key={field} className="row sp">
            <Checkbox
              checked
              onChange={() =>
                set({ columns: shown.length > 1 ? shown.filter((one) => one !== field) : shown })
              }
              label={fieldTitle(props, field)}
            />
            <span className="row">
              <IconButton
                icon="chevron-up"
                size="small"
                kind="quiet"
                label={`Move ${fieldTitle(props, field)} earlier`}
                disabled={index === 0}
                onClick={() => move(index, -1)}
              />
              <IconButton
                icon="chevron-down"
                size="small"
                kind="quiet"
                label={`Move ${fieldTitle(props, field)} later`}
                disabled={index === shown.length - 1}
                onClick={() => move(index, 1)}
              />
            </span>
          </li>
        ))}
        {hidden.map(({ field, title }) => (
          <li key={field}>
            <Checkbox checked={false} onChange={() => set({ columns: [...shown, field] })} label={title} />
          </li>
        ))}
      </ul>
    </PopoverButton>
  );
}
