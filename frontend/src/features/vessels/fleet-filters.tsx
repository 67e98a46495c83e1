import { FLEET_SORTS, type VesselListQuery } from '@stayledger/shared/contracts/vessels';
import { useEffect, useRef, useState } from 'react';
import { PlainInput, PlainSelect } from '../../components/forms/plain-fields';
import type { FleetFilter } from './vessels.queries';
import styles from './fleet.module.css';

type Filter = NonNullable<VesselListQuery['filter']>;
type Sort = NonNullable<VesselListQuery['sort']>;

const FILTER_WORDS: Record<Filter, string> = {
  all: 'All vessels',
  overdue: 'With parts overdue',
  due: 'With parts due',
  waiting: 'With logs waiting',
  'not-assessed': 'With parts not assessed',
};
const SORT_WORDS: Record<Sort, string> = {
  due: 'Next date first',
  name: 'By name',
  'last-log': 'Latest log first',
};
const FILTERS = Object.keys(FILTER_WORDS) as Filter[];
const TYPING_PAUSE_MS = 300;

/** Filters kept in the address, so that a list can be sent, reloaded and come back to. */
export function readFleetFilter(search: URLSearchParams): Required<Omit<FleetFilter, 'q'>> & { q?: string } {
  const filter = FILTERS.find((candidate) => candidate === search.get('filter')) ?? 'all';
  const sort = FLEET_SORTS.find((candidate) => candidate === search.get('sort')) ?? 'due';
  const q = search.get('q')?.trim().slice(0, 120);
  return q ? { q, sort, filter } : { sort, filter };
}

export function FleetFilters({
  filter,
  onChange,
}: {
  filter: ReturnType<typeof readFleetFilter>;
  onChange: (next: Partial<FleetFilter>) => void;
}) {
  const asked = filter.q ?? '';
  const [typed, setTyped] = useState(asked);
  const [known, setKnown] = useState(asked);
  const [sent, setSent] = useState(asked);
  if (asked !== known) {
    // The address changed. Where it was not this field that changed it, the field follows; otherwise what was typed since
    // then stays.
    setKnown(asked);
    if (asked !== sent) setTyped(asked);
  }
  const latest = useRef(onChange);
  useEffect(() => {
    latest.current = onChange;
  });
  useEffect(() => {
    const words = typed.trim();
    if (words === asked) return;
    const pause = window.setTimeout(() => {
      setSent(words);
      latest.current({ q: words || undefined });
    }, TYPING_PAUSE_MS);
    return () => window.clearTimeout(pause);
  }, [typed, asked]);

  return (
    <div role="search" className={styles.filters}>
      <PlainInput
        label="Find a vessel"
        type="search"
        maxLength={120}
        value={typed}
        onChange={(event) => setTyped(event.target.value)}
      />
      <PlainSelect
        label="Show"
        value={filter.filter}
        onChange={(event) => onChange({ filter: event.target.value as Filter })}
      >
        {FILTERS.map((key) => (
          <option key={key} value={key}>
            {FILTER_WORDS[key]}
          </option>
        ))}
      </PlainSelect>
      <PlainSelect
        label="Order"
        value={filter.sort}
        onChange={(event) => onChange({ sort: event.target.value as Sort })}
      >
        {FLEET_SORTS.map((key) => (
          <option key={key} value={key}>
            {SORT_WORDS[key]}
          </option>
        ))}
      </PlainSelect>
    </div>
  );
}
