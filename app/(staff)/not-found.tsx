import { ClosedDoor } from '@/components/shell/closed-door';

/** Inside the masthead, so that the page has one head and one main part. */
export default function NotFound() {
  return <ClosedDoor why="not found" />;
}
