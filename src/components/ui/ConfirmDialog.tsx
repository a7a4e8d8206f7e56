import { useState, type ReactNode } from 'react';
import { Banner } from './Banner';
import { Button } from './Button';
import { Dialog } from './Dialog';
import { TextInput } from './TextInput';

export interface ConfirmDialogProps {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  /** A question: "Remove Jon from this workspace?" */
  title: ReactNode;
  /** What happens, and what stays. */
  children?: ReactNode;
  /** Says what it does: "Remove Jon". */
  confirmLabel: string;
  cancelLabel?: string;
  /** Closes when it settles; when it throws, the dialog stays and shows the message. */
  onConfirm: () => void | Promise<void>;
  danger?: boolean;
  /** The person must type this text first. */
  typeToConfirm?: string;
}

/** Asks before something that cannot be taken back. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  const { open, onOpenChange, confirmLabel, cancelLabel = 'Cancel', danger, typeToConfirm } = props;
  const [pending, setPending] = useState(false);
  const [typed, setTyped] = useState('');
  const [problem, setProblem] = useState<string | null>(null);
  const change = (next: boolean) => {
    setTyped('');
    setProblem(null);
    onOpenChange(next);
  };
  const confirm = async () => {
    setPending(true);
    setProblem(null);
    try {
      await props.onConfirm();
      change(false);
    } catch (cause) {
      setProblem(cause instanceof Error ? cause.message : 'This did not work. Nothing was changed.');
    } finally {
      setPending(false);
    }
  };
  const actions = (
    <>
      <Button kind="quiet" onClick={() => change(false)} disabled={pending} autoFocus>
        {cancelLabel}
      </Button>
      <Button
        kind={danger ? 'danger' : 'primary'}
        pending={pending}
        disabled={typeToConfirm !== undefined && typed !== typeToConfirm}
        onClick={() => void confirm()}
      >
        {confirmLabel}
      </Button>
    </>
  );
  return (
    <Dialog open={open} onOpenChange={change} title={props.title} role="alertdialog" actions={actions}>
      <div className="ink2">{props.children}</div>
      {typeToConfirm !== undefined && (
        <TextInput
          label={`Type “${typeToConfirm}” to confirm`}
          value={typed}
          autoComplete="off"
          onChange={(event) => setTyped(event.target.value)}
        />
      )}
      {problem && <Banner tone="error">{problem}</Banner>}
    </Dialog>
  );
}
