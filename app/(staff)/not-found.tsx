import { ButtonLink } from '@/components/ui/button';
import { PageHead } from '@/components/ui/page';

/** Inside the masthead, so that the page has one head and one main part. */
export default function NotFound() {
  return (
    <>
      <PageHead title="There is no such page" lede="It may be at another site, or the address was mistyped. What is out of your reach looks the same as what does not exist." />
      <div className="mt-6">
        <ButtonLink href="/">Go to your start page</ButtonLink>
      </div>
    </>
  );
}
