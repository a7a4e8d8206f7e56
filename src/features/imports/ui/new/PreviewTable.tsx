import { useState } from 'react';
import { Card, Switch } from '@/components/ui';
import { formatNumber } from '@/lib/format';
import type { SampleTable } from '@/features/files';
import type { Problems } from '../../problems';

const SHOWN = 12;

/** The first rows as they will be read; what would be refused is marked with its reason. */
export function PreviewTable({
  title,
  side,
  table,
  problems,
}: {
  title: string;
  side: 'ties' | 'members';
  table: SampleTable;
  problems: Problems | null;
}) {
  const [only, setOnly] = useState(false);
  const bad = new Map<number, { column: string | null; reason: string }[]>();
  for (const { file, line, column, reason } of problems?.kept ?? [])
    if (file === side) bad.set(line, [...(bad.get(line) ?? []), { column, reason }]);
  const rows = (only ? table.rows.filter((row) => bad.has(row.line)) : table.rows).slice(0, SHOWN);
  return (
    <Card
      level={3}
      title={title}
      aside={
        bad.size > 0 ? (
          <Switch label="Show problems only" checked={only} onChange={setOnly} />
        ) : (
          <span>first {formatNumber(Math.min(SHOWN, table.rows.length))} rows</span>
        )
      }
      flush
    >
      <div className="tw" tabIndex={0} role="region" aria-label={title}>
        <table className="tbl pvw">
          <thead>
            <tr>
              <th scope="col" className="r">
                Line
              </th>
              {table.headers.map((header, i) => (
                <th key={i} scope="col">
                  {header}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => {
              const wrong = bad.get(row.line) ?? [];
              const whole = wrong.find((one) => one.column === null);
              return (
                <tr key={row.line}>
                  <td className="r mut">{row.line}</td>
                  {whole ? (
                    <td className="bad" colSpan={table.headers.length}>
                      {whole.reason}
                    </td>
                  ) : (
                    table.headers.map((header, i) => {
                      const cell = row.cells[i] ?? '';
                      const problem = wrong.find((one) => one.column === header);
                      return (
                        <td key={i} className={problem ? 'bad' : undefined} title={problem?.reason}>
                          {cell === '' ? <span className="mut">blank</span> : cell.slice(0, 80)}
                          {problem && <span className="vh">, {problem.reason}</span>}
                        </td>
                      );
                    })
                  )}
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
    </Card>
  );
}
