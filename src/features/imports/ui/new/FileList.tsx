import { Banner, Icon, IconButton, Select } from '@/components/ui';
import { formatNumber } from '@/lib/format';
import type { ReadSettings } from '@/features/files';
import type { LoadedFile, Role } from './load-file';
import { ReadingOptions } from './ReadingOptions';

const ROLES: readonly { id: Role; label: string }[] = [
  { id: 'ties', label: 'Ties' },
  { id: 'members', label: 'Members' },
  { id: 'mapping', label: 'Changed ids' },
  { id: 'none', label: 'Not used' },
];
const GRAPH_ROLES: readonly { id: Role; label: string }[] = [
  { id: 'graph', label: 'Ties and members' },
  { id: 'none', label: 'Not used' },
];

function size({ file, sample, whole }: LoadedFile): string {
  const bytes =
    file.size < 1024 * 1024
      ? `${formatNumber(Math.max(1, Math.round(file.size / 1024)))} KB`
      : `${formatNumber(Math.round(file.size / 1024 / 1024))} MB`;
  if (!sample) return bytes;
  const rows = formatNumber(sample.table.rows.length);
  return `${bytes}, ${whole ? `${rows} rows` : `first ${rows} rows read`}, ${sample.table.headers.length} columns`;
}

/** The chosen files: what each is for, and how it is read. */
export function FileList({
  files,
  onRole,
  onSettings,
  onRemove,
}: {
  files: readonly LoadedFile[];
  onRole: (key: string, role: Role) => void;
  onSettings: (key: string, settings: ReadSettings) => void;
  onRemove: (key: string) => void;
}) {
  return (
    <ul className="card filelist">
      {files.map((one) => (
        <li key={one.key}>
          <div className="row wrap sp">
            <span className="row grow">
              <Icon name="file" />
              <span>
                <h2 className="b small" style={{ overflowWrap: 'anywhere' }}>
                  {one.file.name}
                </h2>
                <span className="small mut">{size(one)}</span>
              </span>
            </span>
            <span className="row">
              <Select
                label={`What ${one.file.name} holds`}
                labelPlace="hidden"
                size="small"
                value={one.role}
                options={one.sample?.members ? GRAPH_ROLES : ROLES}
                onChange={(role) => onRole(one.key, role)}
              />
              <ReadingOptions
                name={one.file.name}
                sample={one.sample}
                settings={one.settings}
                onChange={(settings) => onSettings(one.key, settings)}
              />
              <IconButton
                icon="close"
                label={`Remove ${one.file.name}`}
                kind="quiet"
                size="small"
                onClick={() => onRemove(one.key)}
              />
            </span>
          </div>
          {one.problem && <Banner tone="error">{one.problem}</Banner>}
          {one.sample?.note && <p className="small mut">{one.sample.note}</p>}
        </li>
      ))}
    </ul>
  );
}
