import type { CurveDto, ListedCurveDto } from '@stayledger/shared/contracts/curves';
import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { ButtonLink } from '../../components/plain-button/plain-button';
import { DataTable } from '../../components/tables/data-table';
import { CurveChart } from '../../features/reference/curve-chart';
import { CurveFacts } from '../../features/reference/curve-facts';
import { lineOfSegments } from '../../features/reference/curve-line';
import { measureUnit } from '../../features/reference/reference-words';
import { referenceQueries } from '../../features/reference/reference.queries';
import styles from '../../features/reference/reference.module.css';
import { useFormat } from '../../lib/formatting/use-format';
import { useSession } from '../../lib/session';

export function CurvePage() {
  const { curveId = '' } = useParams();
  const query = useQuery(referenceQueries.curve(curveId));
  const session = useSession();
  const isOwn = (firm: ListedCurveDto['firm']) =>
    session.permissions.includes('curves:add') && session.roles.some(({ firmId }) => firmId === firm?.id);
  return (
    <QueryView query={query} loadingLabel="Opening the curve">
      {(curve) => (
        <>
          <PageHeading
            title={curve.name}
            above={<Link to={paths.reference.pattern}>Reference data</Link>}
            below={curve.firm ? `${curve.appliesTo}. Added by ${curve.firm.name}` : curve.appliesTo}
            actions={
              isOwn(curve.firm) && lineOfSegments(curve.segments) ? (
                <ButtonLink to={paths.reviseCurve.to(curve.id)}>Correct this curve</ButtonLink>
              ) : undefined
            }
          />
          <CurveChart curve={curve} csvName={curve.id} />
          <h2>What it is and where it comes from</h2>
          <CurveFacts curve={curve} />
          <Segments curve={curve} />
        </>
      )}
    </QueryView>
  );
}

function Segments({ curve }: { curve: CurveDto }) {
  const format = useFormat();
  const unit = measureUnit(curve.measure);
  return (
    <section aria-labelledby="segments" className={styles.narrow}>
      <h2 id="segments">Segments</h2>
      <p>log10 N = log10 a − m · log10 S, in the first segment whose lowest range S reaches.</p>
      <DataTable
        caption={`Segments of ${curve.name}`}
        rows={curve.segments}
        rowKey={(segment) => String(segment.above)}
        columns={[
          {
            key: 'above',
            title: unit ? `From range, ${unit}` : 'From range',
            numeric: true,
            render: (segment) => format.significant(segment.above, 4),
          },
          {
            key: 'm',
            title: 'm',
            help: 'slope',
            numeric: true,
            render: (segment) => format.significant(segment.m, 4),
          },
          {
            key: 'a',
            title: 'log10 a',
            numeric: true,
            render: (segment) => format.number(segment.log10a, 4),
          },
        ]}
      />
    </section>
  );
}
