import type { ReactNode } from 'react';
import { Menu as AriaMenu, MenuItem, MenuTrigger, Separator, Popover } from 'react-aria-components';
import { cx } from './classes';
import { Icon, type IconName } from './Icon';
import { TriggerButton, type TriggerProps } from './TriggerButton';

export interface MenuEntry {
  id: string;
  label: string;
  description?: ReactNode;
  icon?: IconName;
  /** Key shown at the end, such as "S". */
  shortcut?: string;
  href?: string;
  onAction?: () => void;
  danger?: boolean;
  /** Marks the entry in force. */
  current?: boolean;
  disabled?: boolean;
}

export interface MenuProps extends TriggerProps {
  /** Accessible name of the list; the trigger's words when left out. */
  label?: string;
  entries: readonly (MenuEntry | 'separator')[];
  placement?: 'bottom start' | 'bottom end' | 'top start' | 'top end';
}

/** A button with a list of actions or links. */
export function Menu({ label, entries, placement = 'bottom start', ...trigger }: MenuProps) {
  return (
    <MenuTrigger>
      <TriggerButton {...trigger} />
      <Popover className="menu" placement={placement} offset={6}>
        <AriaMenu aria-label={label}>
          {entries.map((entry, i) =>
            entry === 'separator' ? <Separator key={`line ${i}`} /> : <Entry key={entry.id} entry={entry} />,
          )}
        </AriaMenu>
      </Popover>
    </MenuTrigger>
  );
}

function Entry({ entry }: { entry: MenuEntry }) {
  return (
    <MenuItem
      id={entry.id}
      textValue={entry.label}
      className={cx('mi', entry.danger && 'warn', entry.current && 'on')}
      isDisabled={entry.disabled}
      href={entry.href}
      onAction={entry.onAction}
    >
      {entry.icon && <Icon name={entry.icon} small />}
      <span className="grow">
        {entry.label}
        {entry.description && <span className="desc">{entry.description}</span>}
      </span>
      {entry.current && <Icon name="check" small />}
      {entry.shortcut && <kbd>{entry.shortcut}</kbd>}
    </MenuItem>
  );
}
