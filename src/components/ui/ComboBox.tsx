import type { ReactNode } from 'react';
import {
  Button,
  ComboBox as AriaComboBox,
  Input,
  Label,
  ListBox,
  Popover,
  Text,
} from 'react-aria-components';
import { Icon } from './Icon';
import { OptionRow, type Option } from './Select';

export interface ComboBoxProps<T extends string> {
  label: string;
  hideLabel?: boolean;
  options: readonly Option<T>[];
  value: T | null;
  onChange: (value: T | null) => void;
  /** For options that come from the server: hand in what was typed and new options; no filtering is done here. */
  inputValue?: string;
  onInputChange?: (text: string) => void;
  placeholder?: string;
  hint?: ReactNode;
  error?: ReactNode;
  /** Shown in the open list when nothing fits. */
  none?: ReactNode;
  isDisabled?: boolean;
}

/** Type to find one of many. */
export function ComboBox<T extends string>(props: ComboBoxProps<T>) {
  const { options, onInputChange, inputValue } = props;
  return (
    <AriaComboBox
      {...(onInputChange
        ? { items: [...options], inputValue, onInputChange }
        : { defaultItems: [...options] })}
      value={props.value}
      onChange={(key) => props.onChange(options.find((option) => option.id === key)?.id ?? null)}
      allowsEmptyCollection
      menuTrigger="focus"
      isDisabled={props.isDisabled}
      isInvalid={!!props.error}
    >
      <Label className={props.hideLabel ? 'vh' : 'f'}>{props.label}</Label>
      <div className="combo">
        <Input className="inp" placeholder={props.placeholder} />
        <Button className="drop" aria-label="Show all">
          <Icon name="chevron-down" small />
        </Button>
      </div>
      {props.error ? (
        <Text slot="errorMessage" className="err">
          <Icon name="warning" small />
          {props.error}
        </Text>
      ) : (
        props.hint && (
          <Text slot="description" className="hint" style={{ display: 'block' }}>
            {props.hint}
          </Text>
        )
      )}
      <Popover className="menu" offset={6} style={{ width: 'var(--trigger-width)', maxHeight: 320 }}>
        <ListBox<Option<T>>
          renderEmptyState={() => <div className="none">{props.none ?? 'Nothing fits'}</div>}
        >
          {(option) => <OptionRow option={option} />}
        </ListBox>
      </Popover>
    </AriaComboBox>
  );
}
