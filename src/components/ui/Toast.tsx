import {
  UNSTABLE_Toast as AriaToast,
  UNSTABLE_ToastContent as ToastContent,
  UNSTABLE_ToastQueue as ToastQueue,
  UNSTABLE_ToastRegion as AriaToastRegion,
  Button,
  Text,
} from 'react-aria-components';
import { cx } from './classes';
import { Icon } from './Icon';

interface ToastMessage {
  text: string;
  tone: 'done' | 'error';
  action?: { label: string; onAction: () => void };
}

/** One queue for the page: islands share it, because they share this module. */
const queue = new ToastQueue<ToastMessage>({ maxVisibleToasts: 3 });

export interface ToastOptions {
  tone?: 'done' | 'error';
  action?: ToastMessage['action'];
  /** Milliseconds; errors and toasts with an action stay longer. 0 stays until it is closed. */
  timeout?: number;
}

/** Says that something was done, or was not: `toast('Case recorded: Keep watching', { action: { label: 'Undo', onAction } })`. */
export function toast(text: string, { tone = 'done', action, timeout }: ToastOptions = {}): void {
  const stay = timeout ?? (tone === 'error' ? 0 : action ? 10_000 : 6_000);
  queue.add(
    { text, tone, ...(action && { action }) },
    stay > 0 ? { timeout: Math.max(stay, 5_000) } : undefined,
  );
}

/** Where toasts appear; App.astro has one, so pages need none. */
export function ToastRegion() {
  return (
    <AriaToastRegion queue={queue} className="toasts" aria-label="Messages">
      {({ toast: item }) => (
        <AriaToast toast={item} className={cx('toast', item.content.tone === 'error' && 'bad')}>
          <Icon name={item.content.tone === 'error' ? 'warning' : 'check'} small />
          <ToastContent className="grow">
            <Text slot="title">{item.content.text}</Text>
          </ToastContent>
          {item.content.action && (
            <Button
              className="btn sm quiet"
              onPress={() => {
                item.content.action?.onAction();
                queue.close(item.key);
              }}
            >
              {item.content.action.label}
            </Button>
          )}
          <Button slot="close" className="btn sm quiet ico" aria-label="Close message">
            <Icon name="close" small />
          </Button>
        </AriaToast>
      )}
    </AriaToastRegion>
  );
}
