import { EmptyState } from '../../components/feedback/empty-state';
import { ButtonLink } from '../../components/plain-button/plain-button';
import { PageHeading } from '../../components/page-heading/page-heading';
import { paths } from '../../app/paths';

/** Insurers read signed reports and nothing else; there is none to read until reports can be signed. */
export function PortfolioPage() {
  return (
    <>
      <PageHeading title="Portfolio" />
      <EmptyState
        title="No report is shared with you"
        actions={<ButtonLink to={paths.reference.pattern}>Read the curves and their sources</ButtonLink>}
      >
        <p>
          The signed fatigue reports that owners share with your firm will stand here, one line a vessel: what
          is overdue, provisional or not assessed, and what changed since the last renewal.
        </p>
        <p>
          You see nothing of a vessel before its owner shares a report with you, and nothing after that grant
          has ended.
        </p>
      </EmptyState>
    </>
  );
}
