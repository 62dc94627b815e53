import { ClosedDoor } from '@/components/shell/closed-door';

/** Inside the masthead, so that the page has one head and one main part. */
export default function Forbidden() {
  return <ClosedDoor why="forbidden" />;
}
