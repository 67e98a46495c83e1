import type { DetailWithChoiceDto } from '@stayledger/shared/contracts/detail-choices';
import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import type { DataTableColumn } from '../../components/tables/data-table';
import type { Formatter } from '../../lib/formatting/format';
import { ARTICULATION_CHOICE_WORDS } from './articulation-words';
import styles from './detail-choices.module.css';

interface Options {
  partId: string;
  format: Formatter;
  zone: string;
  mayChange: boolean;
}

/** What each detail stands on: by default, or as somebody decided and on what evidence. */
export function detailChoiceColumns({
  partId,
  format,
  zone,
  mayChange,
}: Options): DataTableColumn<DetailWithChoiceDto>[] {
  const columns: DataTableColumn<DetailWithChoiceDto>[] = [
    {
      key: 'name',
      title: 'Detail',
      render: (item) => (
        <>
          <strong>{item.name}</strong>
          <p className={styles.note}>{item.explanation}</p>
          {item.estimates.map((estimate) => (
            <p key={estimate} className={styles.note}>
              Estimate: {estimate}
            </p>
          ))}
        </>
      ),
      value: (item) => item.name,
    },
    {
      key: 'curve',
      title: 'Curve',
      render: (item) =>
        item.curve === null ? (
          'none that serves'
        ) : (
          <Link to={paths.curve.to(item.curve.id)}>
            {item.curve.name}, version {item.curve.version}
          </Link>
        ),
      value: (item) => item.curve?.name ?? null,
    },
    {
      key: 'factor',
      title: 'Design fatigue factor',
      numeric: true,
      render: (item) => format.number(item.designFatigueFactor),
      value: (item) => item.designFatigueFactor,
    },
    {
      key: 'decided',
      title: 'Decided',
      render: (item) => decidedWords(item),
      value: (item) => decidedWords(item),
    },
    {
      key: 'confirmed',
      title: 'Confirmed by, with evidence',
      render: ({ choice }) =>
        choice === null ? (
          'nobody yet'
        ) : (
          <>
            {choice.confirmedByName}, {format.instant(choice.confirmedAt, zone)}
            <p className={styles.note}>{choice.evidence}</p>
          </>
        ),
      value: ({ choice }) => (choice === null ? null : `${choice.confirmedByName}: ${choice.evidence}`),
    },
  ];
  if (!mayChange) return columns;
  return [
    ...columns,
    {
      key: 'change',
      title: 'Change',
      render: (item) => (
        <Link to={paths.changeDetail.to(partId, item.key)} aria-label={`Change the ${item.name}`}>
          Change
        </Link>
      ),
    },
  ];
}

function decidedWords({ choice }: DetailWithChoiceDto): string {
  if (choice === null) return 'all by default';
  const words = [
    choice.curve === null ? null : 'curve',
    choice.articulation === null ? null : ARTICULATION_CHOICE_WORDS[choice.articulation],
    choice.designFatigueFactor === null ? null : 'design fatigue factor',
  ].filter((word) => word !== null);
  return words.length === 0 ? 'all by default' : words.join(', ');
}
