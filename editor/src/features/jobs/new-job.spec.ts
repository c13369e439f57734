import { describe, expect, it } from 'vitest';
import { emptyNewJob, type NewJobForm, newJobFieldOf, newJobFormSchema, newJobOf } from './new-job';

const filled: NewJobForm = {
  ...emptyNewJob,
  name: 'Harrow Bank, rear garden',
  clientName: 'Orla Penhallow',
  address: '4 Harrow Bank, Marlow Bend',
};
const faults = (form: NewJobForm) =>
  newJobFormSchema.safeParse(form).error?.issues.map((issue) => issue.path.join('.')) ?? [];

describe('a new job', () => {
  it('needs a name, a client and a place', () => {
    expect(faults(emptyNewJob)).toContain('name');
    expect(faults({ ...filled, clientName: ' ' })).toEqual(['clientName']);
    expect(faults({ ...filled, address: '' })).toEqual(['address']);
    expect(faults(filled)).toEqual([]);
  });

  it('takes an e-mail address or none', () => {
    expect(faults({ ...filled, clientEmail: 'orla' })).toEqual(['clientEmail']);
    expect(faults({ ...filled, clientEmail: 'orla@example.org' })).toEqual([]);
  });

  it('asks only for what the choices leave open', () => {
    const existing = { ...filled, clientMode: 'existing', propertyMode: 'existing' } as const;
    expect(faults({ ...existing, clientName: '', address: '' })).toEqual(['clientId', 'propertyId']);
    expect(faults({ ...existing, clientId: 'c', propertyId: 'p', clientName: '', address: '' })).toEqual([]);
  });

  it('sends a new client without empty texts, and names the property by its address', () => {
    expect(newJobOf(filled)).toMatchObject({
      client: { name: 'Orla Penhallow', email: null, phone: null },
      property: { name: '4 Harrow Bank', address: '4 Harrow Bank, Marlow Bend' },
    });
  });

  it('sends only the id of a client and a property that there are', () => {
    const sent = newJobOf({
      ...filled,
      clientMode: 'existing',
      clientId: 'c',
      propertyMode: 'existing',
      propertyId: 'p',
    });
    expect([sent.client, sent.property]).toEqual([{ id: 'c' }, { id: 'p' }]);
  });

  it('knows its own field for what the server names', () => {
    expect(newJobFieldOf('client.email')).toBe('clientEmail');
    expect(newJobFieldOf('name')).toBe('name');
  });
});
