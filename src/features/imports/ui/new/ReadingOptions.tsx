import { PopoverButton, Select } from '@/components/ui';
import { isGraph, type ReadSettings, type Sample } from '@/features/files';

const AUTO = 'auto';

/** One setting: what was detected stands first, and can be corrected. */
function Setting<T extends string>({
  label,
  value,
  detected,
  options,
  onChange,
}: {
  label: string;
  value: T | undefined;
  detected: T | undefined;
  options: readonly { id: T; label: string }[];
  onChange: (value: T | undefined) => void;
}) {
  const found = options.find((one) => one.id === detected)?.label;
  return (
    <Select
      label={label}
      size="small"
      full
      value={value ?? AUTO}
      onChange={(next) => onChange(next === AUTO ? undefined : (next as T))}
      options={[{ id: AUTO, label: found ? `Detected: ${found}` : 'Detected' }, ...options]}
    />
  );
}

/** How a file is read: encoding, delimiter, quotation marks, header, decimal mark, dates. */
export function ReadingOptions({
  name,
  sample,
  settings,
  onChange,
}: {
  name: string;
  sample: Sample | null;
  settings: ReadSettings;
  onChange: (settings: ReadSettings) => void;
}) {
  const set = <K extends keyof ReadSettings>(key: K, value: ReadSettings[K]): void => {
    const { [key]: _before, ...rest } = settings;
    onChange(value === undefined ? rest : { ...rest, [key]: value });
  };
  const layout = sample?.layout;
  const table = !layout || layout.format === 'delimited';
  return (
    <PopoverButton
      label={`How ${name} is read`}
      trigger="How it is read"
      size="small"
      look="quiet"
      width={280}
    >
      <div className="col" style={{ gap: 10, padding: 12 }}>
        <Setting
          label="Letters"
          value={settings.encoding}
          detected={layout?.encoding}
          options={[
            { id: 'utf-8', label: 'UTF-8' },
            { id: 'windows-1252', label: 'Windows-1252' },
            { id: 'utf-16le', label: 'UTF-16, little-endian' },
            { id: 'utf-16be', label: 'UTF-16, big-endian' },
          ]}
          onChange={(value) => set('encoding', value)}
        />
        {table && (
          <>
            <Setting
              label="Between cells"
              value={settings.delimiter}
              detected={layout?.delimiter}
              options={[
                { id: ',', label: 'Comma' },
                { id: ';', label: 'Semicolon' },
                { id: '\t', label: 'Tab' },
                { id: '|', label: 'Vertical bar' },
              ]}
              onChange={(value) => set('delimiter', value)}
            />
            <Setting
              label="Around cells"
              value={settings.quote}
              detected={layout?.quote}
              options={[
                { id: 'double', label: 'Double quotation marks' },
                { id: 'single', label: 'Single quotation marks' },
                { id: 'none', label: 'Nothing' },
              ]}
              onChange={(value) => set('quote', value)}
            />
            <Select
              label="First row"
              size="small"
              full
              value={settings.header === false ? 'data' : 'names'}
              onChange={(value) => set('header', value === 'names' ? undefined : false)}
              options={[
                { id: 'names', label: 'Names of the columns' },
                { id: 'data', label: 'Data already' },
              ]}
            />
          </>
        )}
        {!(layout && isGraph(layout.format)) && (
          <>
            <Setting
              label="Decimal mark"
              value={settings.decimal}
              detected={undefined}
              options={[
                { id: 'point', label: 'Point: 3.5' },
                { id: 'comma', label: 'Comma: 3,5' },
              ]}
              onChange={(value) => set('decimal', value)}
            />
            <Setting
              label="Dates"
              value={settings.dates}
              detected={undefined}
              options={[
                { id: 'year-first', label: '2026-11-28' },
                { id: 'day-first', label: '28/11/2026' },
                { id: 'month-first', label: '11/28/2026' },
              ]}
              onChange={(value) => set('dates', value)}
            />
          </>
        )}
      </div>
    </PopoverButton>
  );
}
