import type { ReactNode } from 'react';
import { Dialog, DialogTrigger, Popover } from 'react-aria-components';
import { TriggerButton, type TriggerProps } from './TriggerButton';

export interface PopoverButtonProps extends TriggerProps {
  /** Accessible name of what opens. */
  label: string;
  children: ReactNode | ((close: () => void) => ReactNode);
  placement?: 'bottom start' | 'bottom end' | 'top start' | 'top end';
  isOpen?: boolean;
  onOpenChange?: (open: boolean) => void;
  width?: number;
}

/** A button that opens a small panel beside itself (columns, a filter's range …). */
export function PopoverButton(props: PopoverButtonProps) {
  const { label, children, placement = 'bottom start', isOpen, onOpenChange, width, ...trigger } = props;
  return (
    <DialogTrigger isOpen={isOpen} onOpenChange={onOpenChange}>
      <TriggerButton {...trigger} />
      <Popover className="menu" placement={placement} offset={6} style={{ width }}>
        <Dialog aria-label={label} className="pop">
          {({ close }) => <>{typeof children === 'function' ? children(close) : children}</>}
        </Dialog>
      </Popover>
    </DialogTrigger>
  );
}
