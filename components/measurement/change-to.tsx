import { Button } from '../ui/button';
import type { Doubt } from './typed-sitting';

/** 'Change to 93.4 kg': puts in the field what was probably meant. */
export function ChangeTo({ likely, onChange }: { likely: NonNullable<Doubt['likely']>; onChange: (typed: string) => void }) {
  return (
    <Button kind="link" onClick={() => onChange(likely.typed)}>
      Change to {likely.typed} {likely.unit}
    </Button>
  );
}
