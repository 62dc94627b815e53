import Link from 'next/link';
import { Mark } from '../ui/signs';

/** The mark and the name; they lead home. */
export function Brand({ href }: { href: string }) {
  return (
    <Link className="brand" href={href}>
      <Mark />
      Tidemark
    </Link>
  );
}
