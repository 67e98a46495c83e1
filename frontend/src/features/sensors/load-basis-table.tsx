import type { LoadBasesDto, PositionDto } from '@stayledger/shared/contracts/rig';
import { DataTable, type DataTableColumn } from '../../components/tables/data-table';

type Basis = LoadBasesDto['items'][number] & { label: string };

const BASIS_WORDS = {
  measured: 'Measured',
  mirrored: 'Can be mirrored',
  'in-line': 'In line',
  none: 'None',
} as const;

const COLUMNS: DataTableColumn<Basis>[] = [
  { key: 'place', title: 'Place', render: ({ label }) => label },
  { key: 'basis', title: 'From where', render: ({ basis }) => BASIS_WORDS[basis] },
  { key: 'words', title: 'Why', render: ({ words }) => words },
  { key: 'improve', title: 'What would better it', render: ({ improve }) => improve ?? '–' },
];

/** Where the loads of each standing part can come from, by the sensors registered. */
export function LoadBasisTable({
  bases,
  positions,
}: {
  bases: LoadBasesDto['items'];
  positions: readonly PositionDto[];
}) {
  const labels = new Map(positions.map(({ id, label }) => [id, label]));
  const rows = bases
    .filter(({ basis, improve }) => basis !== 'none' || improve !== null)
    .map((item) => ({ ...item, label: labels.get(item.positionId) ?? '' }));
  if (rows.length === 0) return null;
  return (
    <>
      <h2>Where the loads of each place can come from</h2>
      <DataTable
        caption="Where the loads of each place can come from"
        stackOnPhone
        rows={rows}
        columns={COLUMNS}
        rowKey={({ positionId }) => positionId}
      />
    </>
  );
}
