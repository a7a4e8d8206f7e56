import { Card, Checkbox, NumberInput, SegmentedControl, Select, TextInput } from '@/components/ui';
import type { Choices } from './choices';

/** The day, and how rows become ties. */
export function ChoicesCard({
  choices,
  canAdd,
  onChange,
}: {
  choices: Choices;
  /** There is a snapshot that changes could be added to. */
  canAdd: boolean;
  onChange: (choices: Choices) => void;
}) {
  const set = (change: Partial<Choices>): void => onChange({ ...choices, ...change });
  return (
    <Card title="How ties add up">
      <div className="col" style={{ gap: 14 }}>
        {canAdd && (
          <SegmentedControl
            label="The files hold"
            value={choices.mode}
            onChange={(mode) => set({ mode })}
            options={[
              { value: 'full', label: 'Everything' },
              { value: 'changes', label: 'Only what is new' },
            ]}
          />
        )}
        {choices.mode === 'changes' && (
          <p className="small mut">
            Ties are added to those of the newest snapshot, and filled cells replace its values. The earlier
            snapshot stays as it is.
          </p>
        )}
        <div className="row wrap" style={{ gap: 16, alignItems: 'flex-end' }}>
          <TextInput
            label="Taken on"
            type="date"
            value={choices.takenOn}
            required
            onChange={(event) => set({ takenOn: event.target.value })}
          />
          <TextInput
            label="Label"
            optional
            value={choices.label}
            maxLength={120}
            onChange={(event) => set({ label: event.target.value })}
          />
          <Select
            label="Two directions become one"
            value={choices.directions}
            onChange={(directions) => set({ directions })}
            options={[
              { id: 'sum', label: 'Added up' },
              { id: 'larger', label: 'The larger' },
              { id: 'mutual', label: 'Only mutual ties' },
            ]}
          />
          <Select
            label="Repeats"
            value={choices.repeats}
            onChange={(repeats) => set({ repeats })}
            options={[
              { id: 'sum', label: 'Added up' },
              { id: 'count', label: 'Counted' },
              { id: 'largest', label: 'The largest' },
            ]}
          />
          <NumberInput
            label="Half-life of a tie"
            optional
            unit="days"
            min={1}
            max={100_000}
            value={choices.halfLifeDays}
            onChange={(halfLifeDays) => set({ halfLifeDays })}
          />
          <NumberInput
            label="Smallest weight"
            optional
            min={0}
            value={choices.minimumWeight}
            onChange={(minimumWeight) => set({ minimumWeight })}
          />
        </div>
        <div className="row wrap" style={{ gap: 18 }}>
          <Checkbox
            label="Logarithm of the weight"
            hint="So that a few very busy pairs do not outweigh the rest."
            checked={choices.logWeight}
            onChange={(logWeight) => set({ logWeight })}
          />
          <Checkbox
            label="Leave out members without ties"
            checked={choices.loners === 'leave-out'}
            onChange={(out) => set({ loners: out ? 'leave-out' : 'keep' })}
          />
        </div>
      </div>
    </Card>
  );
}
