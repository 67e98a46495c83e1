import { Enum, ManyToOne, Property, type PropertyOptions } from '@mikro-orm/core';

type EntityClass = abstract new (...args: never[]) => object;
type Options<T> = Pick<PropertyOptions<T>, 'nullable' | 'fieldName' | 'default' | 'defaultRaw' | 'primary'>;

/**
 * Column decorators that say exactly what the migrations say. Types are named here, never inferred: the compilers
 * in use (tsc, SWC) do not emit the same metadata.
 */

/** A foreign key held as the plain id of the other row. Rows are fetched by explicit queries, never lazily. */
export function References(
  entity: () => EntityClass,
  options: { nullable?: boolean; primary?: boolean; fieldName?: string } = {},
) {
  return ManyToOne<object, object>({
    entity,
    mapToPk: true,
    updateRule: 'no action',
    deleteRule: 'no action',
    ...options,
  });
}

/** A foreign key to a versioned row of the reference data, held as `[id, version]`. */
export function ReferencesVersion(
  entity: () => EntityClass,
  joinColumns: [string, string],
  options: { nullable?: boolean } = {},
) {
  return ManyToOne<object, object>({
    entity,
    mapToPk: true,
    joinColumns,
    updateRule: 'no action',
    deleteRule: 'no action',
    ...options,
  });
}

/** An instant: `timestamptz`, a `Date` in memory. Its property ends in `At`. */
export function InstantColumn(options: Options<object> = {}) {
  return Property<object>({ type: 'datetime', columnType: 'timestamptz', length: 6, ...options });
}

/** A calendar day: `date`, a string 'YYYY-MM-DD' in memory. Its property ends in `On`. */
export function DayColumn(options: Options<object> = {}) {
  return Property<object>({ type: 'date', columnType: 'date', ...options });
}

export function TextColumn(options: Options<object> = {}) {
  return Property<object>({ type: 'text', columnType: 'text', ...options });
}

export function UuidColumn(options: Options<object> = {}) {
  return Property<object>({ type: 'uuid', columnType: 'uuid', ...options });
}

export function NumberColumn(options: Options<object> = {}) {
  return Property<object>({ type: 'double', columnType: 'double precision', ...options });
}

export function IntegerColumn(options: Options<object> = {}) {
  return Property<object>({ type: 'integer', columnType: 'int', ...options });
}

export function BooleanColumn(options: Options<object> = {}) {
  return Property<object>({ type: 'boolean', columnType: 'boolean', ...options });
}

export function JsonColumn(options: Options<object> = {}) {
  return Property<object>({ type: 'json', columnType: 'jsonb', ...options });
}

/** Text of which the database itself accepts only the listed values (a check constraint `<table>_<column>_check`). */
export function ChoiceColumn(values: readonly string[], options: Options<object> = {}) {
  return Enum<object>({ items: [...values], columnType: 'text', ...options });
}
