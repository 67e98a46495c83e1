import type { CurveDto } from '@stayledger/shared/contracts/curves';
import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { Link, useParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { LineChart } from '../../components/charts/line-chart';
import { QueryView } from '../../components/feedback/query-view';
import { PageHeading } from '../../components/page-heading/page-heading';
import { DataTable } from '../../components/tables/data-table';
import { CurveFacts } from '../../features/reference/curve-facts';
import { curvePoints } from '../../features/reference/curve-points';
import { MEASURE_WORDS, measureUnit } from '../../features/reference/reference-words';
import { referenceQueries } from '../../features/reference/reference.queries';
import styles from '../../features/reference/reference.module.css';
import { useFormat } from '../../lib/formatting/use-format';

export function CurvePage() {
  const { curveId = '' } = useParams();
  const query = useQuery(referenceQueries.curve(curveId));
  return (
    <QueryView query={query} loadingLabel="Opening the curve">
      {(curve) => (
        <>
          <PageHeading
            title={curve.name}
            above={<Link to={paths.reference.pattern}>Reference data</Link>}
            below={curve.appliesTo}
          />
          <CurveChart curve={curve} />
          <h2>What it is and where it comes from</h2>
          <CurveFacts curve={curve} />
          <Segments curve={curve} />
        </>
      )}
    </QueryView>
  );
}

function CurveChart({ curve }: { curve: CurveDto }) {
  const format = useFormat();
  const points = useMemo(() => curvePoints(curve), [curve]);
  const unit = measureUnit(curve.measure);
  const range = `${MEASURE_WORDS[curve.measure]}${unit ? `, ${unit}` : ''}`;
  const rangeTitle = `${range.charAt(0).toUpperCase()}${range.slice(1)}`;
  return (
    <LineChart
      title="Range against cycles to failure"
      headingLevel={2}
      description="Both axes are logarithmic: one step to the left is a tenth of the life."
      series={[
        { id: 'curve', label: curve.name, points: points.map(({ range: y, cycles: x }) => ({ x, y })) },
      ]}
      xScale="log"
      yScale="log"
      xTitle="Cycles to failure"
      yTitle={rangeTitle}
      formatX={(x) => format.powerOfTen(Number(x))}
      formatY={(y) => format.significant(y, 3)}
      rows={points}
      rowKey={(point) => String(point.range)}
      columns={[
        {
          key: 'range',
          title: rangeTitle,
          numeric: true,
          render: (point) => format.significant(point.range, 4),
          value: (point) => point.range,
        },
        {
          key: 'cycles',
          title: 'Cycles to failure',
          numeric: true,
          render: (point) => format.scientific(point.cycles, 4),
          value: (point) => point.cycles,
        },
      ]}
      csvName={curve.id}
      emptyText="This curve has no part between ten thousand and a thousand million cycles."
    />
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
          { key: 'm', title: 'm', numeric: true, render: (segment) => format.significant(segment.m, 4) },
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
