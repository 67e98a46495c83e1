import { ButtonLink } from '../../components/plain-button/plain-button';
import { PageHeading } from '../../components/page-heading/page-heading';
import { paths } from '../../app/paths';

export function NotFoundPage() {
  return (
    <>
      <PageHeading title="Not found" />
      <p>There is no page at this address, or it is not shared with you.</p>
      <p>Check the address, or ask who sent you the link.</p>
      <ButtonLink to={paths.home.pattern}>Go to the first page</ButtonLink>
    </>
  );
}
