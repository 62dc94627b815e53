import { ButtonLink } from '@/components/ui/button';
import { PageHead } from '@/components/ui/page';

/** Inside the masthead, so that the page has one head and one main part. */
export default function Forbidden() {
  return (
    <>
      <PageHead title="This page is not for your role" lede="You are signed in, but your role does not include what this page shows. Choose another of your roles, or go back." />
      <div className="mt-6">
        <ButtonLink href="/">Go to your start page</ButtonLink>
      </div>
    </>
  );
}
