import { ButtonLink } from '../ui/button';
import { PageHead } from '../ui/page';

const words = {
  forbidden: {
    title: 'This page is not for your role',
    lede: 'You are signed in, but your role does not include what this page shows. Choose another of your roles, or go back.',
  },
  'not found': {
    title: 'There is no such page',
    lede: 'It may be at another site, or the address was mistyped. What is out of your reach looks the same as what does not exist.',
  },
} as const;

/** Why a page does not open, and the way out. Stands inside whichever shell the page has. */
export function ClosedDoor({ why }: { why: keyof typeof words }) {
  return (
    <>
      <PageHead {...words[why]} />
      <div className="mt-6">
        <ButtonLink href="/">Go to your start page</ButtonLink>
      </div>
    </>
  );
}
