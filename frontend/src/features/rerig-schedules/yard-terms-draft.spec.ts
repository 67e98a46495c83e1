import { yardTermsSchema, type YardTermsDto } from '@stayledger/shared/contracts/yard-terms';
import { STARTING_YARD_TERMS } from '@stayledger/shared/rerig-schedule/yard-terms';
import { describe, expect, it } from 'vitest';
import { figureAt, termsGroups, withFigures } from './yard-terms-draft';

const terms: YardTermsDto['terms'] = {
  ...STARTING_YARD_TERMS,
  seasons: [...STARTING_YARD_TERMS.seasons],
  closures: [],
};
const fields = termsGroups('EUR').flatMap((group) => group.fields);
const texts = Object.fromEntries(
  fields.map(({ path, scale }) => [path, String(figureAt(terms, path) / scale)]),
);

describe('the figures of a firm’s terms', () => {
  it('come back as they were when nothing is changed', () => {
    expect(withFigures(terms, fields, texts)).toEqual(terms);
  });

  it('are whole minor units and shares, with a comma or a point', () => {
    const changed = yardTermsSchema.parse(
      withFigures(terms, fields, { ...texts, 'visits.aloft.costMinor': '19,99', contingencyShare: '12.5' }),
    );
    expect(changed.visits.aloft.costMinor).toBe(1999);
    expect(changed.contingencyShare).toBe(0.125);
  });

  it('are refused where one cannot be read', () => {
    const changed = withFigures(terms, fields, { ...texts, 'inspection.hours': 'a day' });
    expect(yardTermsSchema.safeParse(changed).error?.issues[0].path).toEqual(['inspection', 'hours']);
  });
});
