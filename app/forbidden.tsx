import { ClosedDoor } from '@/components/shell/closed-door';
import { PlainShell } from '@/components/shell/plain-shell';

export default function Forbidden() {
  return (
    <PlainShell>
      <ClosedDoor why="forbidden" />
    </PlainShell>
  );
}
