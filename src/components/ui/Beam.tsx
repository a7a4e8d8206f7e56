/** Lengths of the threads that hang from the beam, longest left: the shape of a slow pattern. */
const LENGTHS = [38, 42, 40, 34, 26, 20, 18, 22, 26, 24, 18, 14, 12, 10];

/** The loom beam. Empty: dashed threads that wait. With `progress` 0…1: that share of the threads is drawn in ink. */
export function Beam({ progress }: { progress?: number }) {
  const waiting = progress === undefined;
  const threads = waiting ? LENGTHS.slice(0, 7) : LENGTHS;
  const done = waiting ? 0 : Math.round(Math.min(1, Math.max(0, progress)) * threads.length);
  return (
    <svg
      className="beam"
      viewBox="0 0 200 48"
      width="200"
      height="48"
      fill="none"
      strokeLinecap="round"
      aria-hidden="true"
    >
      <path d={waiting ? 'M2 3h84' : 'M2 3h168'} stroke="var(--c-ink)" strokeWidth="4" />
      {threads.map((length, i) => (
        <path
          key={i}
          className={waiting ? 'th wait' : i < done ? 'th on' : 'th'}
          d={`M${8 + i * 12} 6v${waiting || i < done ? length : 10}`}
        />
      ))}
    </svg>
  );
}
