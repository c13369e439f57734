import { expect, it } from 'vitest';
import { abilitiesOf } from './me';

it('shows an owner everything', () => {
  expect(Object.values(abilitiesOf('owner')).every(Boolean)).toBe(true);
});

it('keeps the company and its people from a designer', () => {
  const { editJobs, editPlan, editCatalogue, editCompany, editMembers } = abilitiesOf('designer');
  expect([editJobs, editPlan, editCatalogue]).toEqual([true, true, true]);
  expect([editCompany, editMembers]).toEqual([false, false]);
});

it('leaves crew the site walk alone', () => {
  const { survey, ...rest } = abilitiesOf('crew');
  expect(survey).toBe(true);
  expect(Object.values(rest).some(Boolean)).toBe(false);
});

it('shows nothing to whoever is in no company', () => {
  expect(Object.values(abilitiesOf(null)).some(Boolean)).toBe(false);
});
