import { uuidv7 } from 'uuidv7';

/** A new row id. Version 7: ids made later sort later, which keeps indexes compact and gives paging a tie-break. */
export function newId(): string {
  return uuidv7();
}
