import type { ReactNode } from 'react';
import {
  Button,
  Label,
  ListBox,
  ListBoxItem,
  Popover,
  Select as AriaSelect,
  SelectValue,
  Text,
} from 'react-aria-components';
import { cx } from './classes';
import { Icon } from './Icon';
import { Tag } from './Tag';

export interface Option<T extends string = string> {
  id: T;
  label: string;
  description?: string;
  /** Letter of a group, drawn as a tag before the label. */
  tag?: string;
  disabled?: boolean;
}

export interface SelectProps<T extends string> {
  label: string;
  options: readonly Option<T>[];
  value: T | null;
  onChange: (value: T) => void;
  /** Above the field; inside it, muted ("Colour  Helpfulness"); or only for assistive technology. */
  labelPlace?: 'above' | 'inside' | 'hidden';
  size?: 'default' | 'small';
  /** Takes the whole width. */
  full?: boolean;
  placeholder?: string;
  hint?: ReactNode;
  error?: ReactNode;
  name?: string;
  isDisabled?: boolean;
  className?: string;
}

/** The row of an option, in Select and ComboBox. */
export function OptionRow<T extends string>({ option }: { option: Option<T> }) {
  return (
    <ListBoxItem id={option.id} textValue={option.label} className="mi" isDisabled={option.disabled}>
      {option.tag && <Tag letter={option.tag} size="small" />}
      <span className="grow">
        <Text slot="label">{option.label}</Text>
        {option.description && (
          <Text slot="description" className="desc">
            {option.description}
          </Text>
        )}
      </span>
      <Icon name="check" small className="tick" />
    </ListBoxItem>
  );
}

/** One of several. Arrow keys, typing ahead, Escape. */
export function Select<T extends string>(props: SelectProps<T>) {
  const { label, options, value, onChange, labelPlace = 'above', size, full, hint, error } = props;
  const chosen = options.find((option) => option.id === value);
  return (
    <AriaSelect
      className={props.className}
      value={value}
      onChange={(key) => {
        const next = options.find((option) => option.id === key);
        if (next) onChange(next.id);
      }}
      name={props.name}
      isDisabled={props.isDisabled}
      isInvalid={!!error}
      placeholder={props.placeholder ?? 'Choose'}
    >
      <Label className={labelPlace === 'above' ? 'f' : 'vh'}>{label}</Label>
      <Button className={cx('sel', size === 'small' && 'sm', full && 'full', !!error && 'bad')}>
        {labelPlace === 'inside' && (
          <span className="lab" aria-hidden="true">
            {label}
          </span>
        )}
        <SelectValue className="val">
          {({ defaultChildren }) =>
            chosen ? (
              <>
                {chosen.tag && <Tag letter={chosen.tag} size="small" />}
                {chosen.label}
              </>
            ) : (
              <span className="mut">{defaultChildren}</span>
            )
          }
        </SelectValue>
        <Icon name="chevron-down" small className="chev" />
      </Button>
      {error ? (
        <Text slot="errorMessage" className="err">
          <Icon name="warning" small />
          {error}
        </Text>
      ) : (
        hint && (
          <Text slot="description" className="hint" style={{ display: 'block' }}>
            {hint}
          </Text>
        )
      )}
      <Popover className="menu" offset={6} style={{ minWidth: 'var(--trigger-width)' }}>
        <ListBox items={[...options]}>{(option) => <OptionRow option={option} />}</ListBox>
      </Popover>
    </AriaSelect>
  );
}
