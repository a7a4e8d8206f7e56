import { useState, type Ref } from 'react';
import { Button, TextArea } from '@/components/ui';
import { formatDate } from '@/lib/format';
import type { CaseDetail } from '../cases';

/** What reviewers wrote down, and a field to add to it. */
export function Notes({
  detail,
  field,
  onAdd,
}: {
  detail: CaseDetail;
  field: Ref<HTMLTextAreaElement>;
  onAdd: (body: string) => Promise<boolean>;
}) {
  const [text, setText] = useState('');
  const notes = detail.events.filter((event) => event.kind === 'note');
  return (
    <div>
      <h2 className="h4">Notes</h2>
      {notes.map((note) => (
        <p key={note.id} className="small" style={{ marginTop: 8, overflowWrap: 'anywhere' }}>
          <b>{note.actor?.name ?? 'A former colleague'}</b>{' '}
          <span className="mut">{formatDate(note.createdAt, 'time')}</span>
          <br />
          {String(note.body.text)}
        </p>
      ))}
      {notes.length === 0 && <p className="small mut">No notes yet.</p>}
      {detail.abilities.work && (
        <form
          className="col"
          style={{ gap: 8, marginTop: 10 }}
          onSubmit={(event) => {
            event.preventDefault();
            if (text.trim()) void onAdd(text.trim()).then((done) => done && setText(''));
          }}
        >
          <TextArea
            label="Add a note"
            value={text}
            rows={2}
            ref={field}
            onChange={(event) => setText(event.target.value)}
          />
          <div>
            <Button size="small" type="submit" disabled={!text.trim()}>
              Add note
            </Button>
          </div>
        </form>
      )}
    </div>
  );
}
