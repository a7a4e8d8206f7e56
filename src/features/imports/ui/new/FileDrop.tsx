import { useRef, useState } from 'react';
import { Button, cx } from '@/components/ui';
import { formatNumber } from '@/lib/format';
import type { ImportLimits } from '../../imports';

/** Where files are dropped or chosen; says what they may hold before anything is sent. */
export function FileDrop({
  limits,
  small,
  onFiles,
}: {
  limits: ImportLimits;
  small: boolean;
  onFiles: (files: File[]) => void;
}) {
  const [over, setOver] = useState(false);
  const picker = useRef<HTMLInputElement>(null);
  return (
    <div
      className={cx('drop', over && 'over', small && 'small-drop')}
      onDragOver={(event) => {
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={() => setOver(false)}
      onDrop={(event) => {
        event.preventDefault();
        setOver(false);
        onFiles([...event.dataTransfer.files]);
      }}
    >
      <p className="h4">{small ? 'Add or replace a file' : 'Drop a ties file and a members file here'}</p>
      <p className="small mut">
        CSV, TSV or JSON Lines, plain or gzip, or both in one GEXF or GraphML file. Up to{' '}
        {formatNumber(Math.floor(limits.fileBytes / 1024 / 1024))} MB each, {formatNumber(limits.tieRows)} tie
        rows, {formatNumber(limits.memberRows)} members, {formatNumber(limits.columns)} columns, ids of{' '}
        {limits.idLength} characters.
      </p>
      <Button onClick={() => picker.current?.click()} icon="file">
        Choose files
      </Button>
      <input
        ref={picker}
        type="file"
        multiple
        className="vh"
        aria-label="Files to load"
        tabIndex={-1}
        onChange={(event) => {
          onFiles([...(event.target.files ?? [])]);
          event.target.value = '';
        }}
      />
    </div>
  );
}
