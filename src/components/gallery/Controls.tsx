import { useState } from 'react';
import {
  AddChip,
  Button,
  Checkbox,
  Chip,
  ComboBox,
  ConfirmDialog,
  Dialog,
  IconButton,
  KeyHint,
  Menu,
  NumberInput,
  PopoverButton,
  RadioCards,
  SegmentedControl,
  Select,
  StatusBadge,
  Switch,
  Tag,
  TextArea,
  TextInput,
  toast,
  Tooltip,
} from '@/components/ui';
import { groupLetter } from '@/lib/groups';

const OPTIONS = [
  { id: 'one', label: 'First group', tag: 'C' },
  { id: 'two', label: 'Second group', tag: 'D', description: 'With a line of explanation' },
  { id: 'three', label: 'Third group', tag: 'AA', disabled: true },
] as const;

function Row({ name, children }: { name: string; children: React.ReactNode }) {
  return (
    <div className="bl">
      <span>{name}</span>
      <div className="col">{children}</div>
    </div>
  );
}

/** All controls at work, for the gallery of the development server. */
export function Controls() {
  const [view, setView] = useState<'map' | 'list'>('map');
  const [group, setGroup] = useState<(typeof OPTIONS)[number]['id']>('one');
  const [found, setFound] = useState<string | null>(null);
  const [lowest, setLowest] = useState<number | null>(6.2);
  const [on, setOn] = useState(true);
  const [choice, setChoice] = useState<'a' | 'b'>('b');
  const [open, setOpen] = useState<'dialog' | 'confirm' | null>(null);
  return (
    <>
      <Row name="Groups">
        <div className="row wrap g4">
          {Array.from({ length: 11 }, (_, i) => (
            <Tag key={i} letter={groupLetter(i)} />
          ))}
          <Tag letter="C" size="small" />
          <Tag letter="C" size="large" />
        </div>
      </Row>
      <Row name="Buttons">
        <div className="row wrap">
          <Button kind="primary">Make reading</Button>
          <Button icon="download">Export</Button>
          <Button kind="quiet">Cancel</Button>
          <Button kind="danger" onClick={() => setOpen('confirm')}>
            Remove
          </Button>
        </div>
        <div className="row wrap">
          <Button pressed>Pressed</Button>
          <Button disabled>Off</Button>
          <Button pending>Saving</Button>
          <Button size="small">Small</Button>
          <IconButton icon="more" label="More" />
          <SegmentedControl
            label="View"
            options={[
              { value: 'map', label: 'Map' },
              { value: 'list', label: 'List' },
            ]}
            value={view}
            onChange={setView}
          />
        </div>
      </Row>
      <Row name="Inputs">
        <div style={{ display: 'grid', gridTemplateColumns: '1fr 1fr', gap: 10 }}>
          <TextInput label="Name of view" defaultValue="Autumn, active only" hint="Others see this name" />
          <NumberInput
            label="Lowest score"
            value={lowest}
            onChange={setLowest}
            min={1}
            max={5}
            step={0.1}
            error={lowest === 6.2 ? 'Use 1 to 5' : undefined}
          />
          <TextArea label="Reason" optional placeholder="Kept with the case" />
          <ComboBox
            label="Find"
            options={OPTIONS}
            value={found}
            onChange={setFound}
            placeholder="Type to find"
          />
        </div>
      </Row>
      <Row name="Choices">
        <div className="row wrap" style={{ gap: 14 }}>
          <Select label="Group" labelPlace="hidden" options={OPTIONS} value={group} onChange={setGroup} />
          <Select
            label="Colour"
            labelPlace="inside"
            size="small"
            options={OPTIONS}
            value={group}
            onChange={setGroup}
          />
          <Checkbox label="On" checked={on} onChange={setOn} />
          <Checkbox label="Some" indeterminate checked={false} onChange={() => undefined} />
          <Switch label="Switch" hideLabel checked={on} onChange={setOn} />
        </div>
        <RadioCards
          legend="Decision"
          hideLegend
          value={choice}
          onChange={setChoice}
          options={[
            { value: 'a', label: 'Keep watching', hint: 'Return after the next snapshot.' },
            { value: 'b', label: 'Reach out', hint: 'A private, friendly message first.' },
          ]}
        />
      </Row>
      <Row name="Chips">
        <div className="row wrap" style={{ gap: 6 }}>
          <Chip onRemove={() => toast('Filter removed')}>Active</Chip>
          <Chip on onRemove={() => toast('Filter removed')}>
            2.35 to 3.15
          </Chip>
          <AddChip />
          <StatusBadge tone="moss" icon="check">
            No concern
          </StatusBadge>
          <StatusBadge tone="weld">Keep watching</StatusBadge>
          <StatusBadge tone="woad">Reach out</StatusBadge>
          <StatusBadge tone="madder">Escalate</StatusBadge>
          <StatusBadge>Data error</StatusBadge>
        </div>
      </Row>
      <Row name="Overlays">
        <div className="row wrap">
          <Menu
            trigger="Saved views"
            icon="bookmark"
            size="small"
            label="Saved views"
            entries={[
              { id: 'a', label: 'All members', description: 'Shared by Orla', icon: 'eye', current: true },
              { id: 'b', label: 'Only you', icon: 'lock' },
              'separator',
              {
                id: 'c',
                label: 'Save this view',
                icon: 'plus',
                shortcut: 'S',
                onAction: () => toast('Saved'),
              },
            ]}
          />
          <PopoverButton trigger="Columns" icon="columns" size="small" label="Columns">
            <Checkbox label="Group" defaultChecked />
          </PopoverButton>
          <Tooltip text="Said on hover and on focus">
            <Button size="small">Tooltip</Button>
          </Tooltip>
          <Button size="small" onClick={() => setOpen('dialog')}>
            Dialog
          </Button>
          <Button
            size="small"
            onClick={() =>
              toast('Case recorded: Keep watching', { action: { label: 'Undo', onAction: () => undefined } })
            }
          >
            Toast
          </Button>
          <Button size="small" onClick={() => toast('This could not be saved', { tone: 'error' })}>
            Error toast
          </Button>
        </div>
        <KeyHint
          hints={[
            { keys: ['←', '→'], does: 'walk ties' },
            { keys: ['Enter'], does: 'select' },
          ]}
        />
      </Row>
      <Dialog
        open={open === 'dialog'}
        onOpenChange={(next) => setOpen(next ? 'dialog' : null)}
        title="Name this view"
        actions={
          <Button kind="primary" onClick={() => setOpen(null)}>
            Save
          </Button>
        }
      >
        <TextInput label="Name" />
      </Dialog>
      <ConfirmDialog
        open={open === 'confirm'}
        onOpenChange={(next) => setOpen(next ? 'confirm' : null)}
        title="Remove Jon from this workspace?"
        confirmLabel="Remove Jon"
        cancelLabel="Keep"
        danger
        onConfirm={() => toast('Removed')}
      >
        His 4 shared views stay. His 2 open cases go back to the queue.
      </ConfirmDialog>
    </>
  );
}
