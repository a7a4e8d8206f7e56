import type { ReactNode } from 'react';
import { Dialog as AriaDialog, Heading, Modal, ModalOverlay } from 'react-aria-components';

export interface DialogProps {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: ReactNode;
  children: ReactNode;
  /** Buttons at the foot, the most cautious first. */
  actions?: ReactNode;
  width?: number;
  role?: 'dialog' | 'alertdialog';
  /** A click outside closes it; Escape always does. Default true, false for alert dialogs. */
  dismissable?: boolean;
}

/** A modal window. Focus is held inside and returns to where it was. */
export function Dialog({
  open,
  onOpenChange,
  title,
  children,
  actions,
  width = 480,
  role = 'dialog',
  dismissable,
}: DialogProps) {
  return (
    <ModalOverlay
      className="scrim"
      isOpen={open}
      onOpenChange={onOpenChange}
      isDismissable={dismissable ?? role === 'dialog'}
    >
      <Modal className="dlg" style={{ '--dlg-w': `${width}px` } as React.CSSProperties}>
        <AriaDialog role={role}>
          <Heading slot="title" level={2} className="h3">
            {title}
          </Heading>
          {children}
          {actions && <div className="foot">{actions}</div>}
        </AriaDialog>
      </Modal>
    </ModalOverlay>
  );
}
