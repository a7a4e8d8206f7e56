import { useState } from 'react';
import { Button, ConfirmDialog, toast } from '@/components/ui';
import { ApiError, sendJson } from '@/lib/api';

/** Accepts or discards a checked import. */
export function ReviewActions({ importId, base }: { importId: string; base: string }) {
  const [pending, setPending] = useState(false);
  const [asking, setAsking] = useState(false);
  const accept = async (): Promise<void> => {
    setPending(true);
    try {
      await sendJson('POST', `/api/v1/imports/${importId}/accept`);
      location.assign(`${base}/map`);
    } catch (error) {
      setPending(false);
      toast(error instanceof ApiError ? error.problem.detail : 'That did not work.', { tone: 'error' });
    }
  };
  return (
    <div className="row">
      <Button onClick={() => setAsking(true)}>Discard</Button>
      <Button kind="primary" pending={pending} onClick={() => void accept()}>
        Load this snapshot
      </Button>
      <ConfirmDialog
        open={asking}
        onOpenChange={setAsking}
        title="Discard this import?"
        confirmLabel="Discard"
        cancelLabel="Keep"
        danger
        onConfirm={async () => {
          await sendJson('POST', `/api/v1/imports/${importId}/discard`);
          location.assign(`${base}/imports`);
        }}
      >
        The checked rows are thrown away. The report stays.
      </ConfirmDialog>
    </div>
  );
}
