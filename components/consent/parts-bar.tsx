export interface PartsBarProps {
  /** How many parts there are. */
  count: number;
  /** Whether each part was read, in order. */
  read: readonly boolean[];
  /** The part in sight, or null when all are behind. */
  current: number | null;
}

/** A bar of the form's parts: read, being read, to come. The words beside it say the same. */
export function PartsBar({ count, read, current }: PartsBarProps) {
  const fill = (index: number) => (read[index] ? 100 : index === current ? 55 : 0);
  return (
    <div className="grid gap-1" style={{ gridTemplateColumns: `repeat(${count}, 1fr)` }} aria-hidden="true">
      {Array.from({ length: count }, (_, index) => (
        <span
          key={index}
          className="block h-2 border"
          style={{
            borderColor: read[index] ? 'var(--fine)' : index === current ? 'var(--act)' : 'var(--edge)',
            background: `linear-gradient(to right, ${read[index] ? 'var(--fine)' : 'var(--act)'} ${fill(index)}%, transparent ${fill(index)}%)`,
          }}
        />
      ))}
    </div>
  );
}
