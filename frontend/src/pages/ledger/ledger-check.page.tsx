import type { VesselDto } from '@stayledger/shared/contracts/vessels';
import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { ErrorState } from '../../components/feedback/error-state';
import { LoadingState } from '../../components/feedback/loading-state';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { PlainButton } from '../../components/plain-button/plain-button';
import { LedgerCheck } from '../../features/ledger/ledger-check';
import { useLedgerCheck } from '../../features/ledger/ledger.mutations';
import { vesselQueries } from '../../features/vessels/vessels.queries';

/** Has every hash and every amount of a vessel's accounts recomputed, and says what differs. */
export function LedgerCheckPage() {
  const { vesselId = '' } = useParams();
  const query = useQuery(vesselQueries.detail(vesselId));
  return (
    <QueryView query={query} loadingLabel="Opening the vessel">
      {(vessel) => (
        <>
          <PageHeading
            title="Check the ledger"
            above={<Link to={paths.vessel.to(vessel.id)}>{vessel.name}</Link>}
          />
          <p>
            Each entry carries a hash of what it says and of the entry before it, and names the spectra, the
            curve and the inputs its amount came from. The check works all of it out again, and compares the
            accounts with the logs that are posted. It changes no entry.
          </p>
          <p>
            It does not open the files of the load logs, and it cannot tell a true recording from a wrong one.
          </p>
          {vessel.permissions.includes('ledger:check') ? (
            <Checking vessel={vessel} />
          ) : (
            <p>A surveyor or rigger who looks after this vessel can have the ledger checked.</p>
          )}
        </>
      )}
    </QueryView>
  );
}

function Checking({ vessel }: { vessel: VesselDto }) {
  const check = useLedgerCheck(vessel.id);
  return (
    <>
      <p>
        <PlainButton weight="primary" disabled={check.isPending} onClick={() => check.mutate()}>
          {check.data === undefined ? 'Check now' : 'Check again'}
        </PlainButton>
      </p>
      {check.isPending && <LoadingState label="Recomputing hashes and amounts" />}
      {check.isError && <ErrorState title="Not checked" error={check.error} />}
      {check.data !== undefined && !check.isPending && <LedgerCheck check={check.data} zone={vessel.zone} />}
    </>
  );
}
