import { ClosedDoor } from '@/components/shell/closed-door';
import { PlainShell } from '@/components/shell/plain-shell';

export default function NotFound() {
  return (
    <PlainShell>
      <ClosedDoor why="not found" />
    </PlainShell>
  );
}
