import type { Shape } from '@/features/network';
import type { ImportWarning } from './imports';
import type { AttributeColumn } from './members';

export interface WarningInput {
  readonly ids: readonly string[];
  readonly inMembersFile: number;
  readonly shape: Shape;
  readonly attributes: readonly AttributeColumn[];
  readonly spaced: number;
  readonly notes: readonly string[];
}

const percent = (share: number): string => `${Math.round(share * 100)} %`;

/** What a person should know before trusting an analysis of this snapshot; nothing here stops the import. */
export function warningsFor({
  ids,
  inMembersFile,
  shape,
  attributes,
  spaced,
  notes,
}: WarningInput): ImportWarning[] {
  const warnings: ImportWarning[] = notes.map((text) => ({ code: 'note', text }));
  const add = (code: string, text: string): void => void warnings.push({ code, text });
  const { offsets } = shape.network;
  let named = 0;
  for (let i = 0; i < inMembersFile; i++) if (offsets[i + 1]! > offsets[i]!) named++;
  if (inMembersFile > 0 && named === 0)
    add(
      'nobody-named',
      'The members file names nobody who stands in the ties file. Check that both use the same ids.',
    );
  else if (inMembersFile > 0 && named < inMembersFile * 0.5)
    add(
      'few-named',
      `Only ${named.toLocaleString('en-GB')} of ${inMembersFile.toLocaleString('en-GB')} members in the members file have a tie.`,
    );
  if (spaced > 0)
    add('spaces', `${spaced.toLocaleString('en-GB')} ids had spaces around them; they were read without.`);
  const folded = new Set(ids.map((id) => id.toLowerCase()));
  if (folded.size < ids.length)
    add(
      'case',
      `${(ids.length - folded.size).toLocaleString('en-GB')} ids differ from another only in capital letters. They were kept apart.`,
    );
  if (shape.components > 1 && shape.largestComponent < ids.length * 0.8)
    add(
      'parts',
      `The community falls into ${shape.components.toLocaleString('en-GB')} parts; the largest holds ${percent(shape.largestComponent / ids.length)} of the members.`,
    );
  for (const one of attributes) {
    if (one.type === 'label') {
      const labels = one.labels!.filter((label) => label !== null);
      if (new Set(labels).size > labels.length * 0.9 && labels.length > 20)
        add(
          'looks-like-id',
          `“${one.name}” is different for almost everyone; it looks like an id or free text.`,
        );
      continue;
    }
    const blank = one.values.reduce((sum, value) => sum + (Number.isNaN(value) ? 1 : 0), 0);
    if (blank > one.values.length * 0.4)
      add(
        'many-blank',
        `“${one.name}” is blank for ${percent(blank / one.values.length)} of the members in the file.`,
      );
  }
  return warnings;
}
