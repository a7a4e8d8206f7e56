import { Fragment } from 'react';

/** Keys and what they do: `[{ keys: ['←', '→'], does: 'walk ties' }]`. */
export function KeyHint({ hints }: { hints: readonly { keys: readonly string[]; does: string }[] }) {
  return (
    <span className="keys">
      {hints.map(({ keys, does }) => (
        <Fragment key={does}>
          {keys.map((key) => (
            <kbd key={key}>{key}</kbd>
          ))}
          <span>{does}</span>
        </Fragment>
      ))}
    </span>
  );
}
