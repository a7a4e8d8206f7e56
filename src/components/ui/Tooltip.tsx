import type { ReactElement, ReactNode } from 'react';
import { Focusable, Tooltip as AriaTooltip, TooltipTrigger } from 'react-aria-components';

/** A short explanation on hover and on focus. The child must be one focusable element. */
export function Tooltip({
  text,
  children,
  delay = 400,
}: {
  text: ReactNode;
  children: ReactElement;
  delay?: number;
}) {
  return (
    <TooltipTrigger delay={delay} closeDelay={80}>
      <Focusable>{children as ReactElement<React.DOMAttributes<Element>, string>}</Focusable>
      <AriaTooltip className="tip" offset={6}>
        {text}
      </AriaTooltip>
    </TooltipTrigger>
  );
}
