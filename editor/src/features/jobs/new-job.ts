import { z } from 'zod';
import type { NewJob } from './api';

const name = z.string().trim().min(1).max(120);
const optionalEmail = z.union([z.literal(''), z.email()]);

/** What the form holds: one flat set of fields, of which the chosen modes say which count. */
export const newJobFormSchema = z
  .object({
    clientMode: z.enum(['new', 'existing']),
    clientId: z.string(),
    clientName: z.string().trim().max(120),
    clientEmail: z.string().trim().max(254),
    clientPhone: z.string().trim().max(40),
    propertyMode: z.enum(['new', 'existing']),
    propertyId: z.string(),
    propertyName: z.string().trim().max(120),
    address: z.string().trim().max(400),
    accessNotes: z.string().trim().max(4000),
    name,
    existingSystem: z.boolean(),
    notes: z.string().max(8000),
  })
  .superRefine((form, ctx) => {
    const fault = (path: string, message: string) => ctx.addIssue({ code: 'custom', path: [path], message });
    if (form.clientMode === 'new') {
      if (form.clientName === '') fault('clientName', 'Please write the name of the client.');
      if (!optionalEmail.safeParse(form.clientEmail).success)
        fault('clientEmail', 'Please write an e-mail address, such as name@example.com.');
    } else if (form.clientId === '') fault('clientId', 'Please choose the client.');
    if (form.propertyMode === 'new') {
      if (form.address === '') fault('address', 'Please write where it is.');
    } else if (form.propertyId === '') fault('propertyId', 'Please choose the property.');
  });
export type NewJobForm = z.infer<typeof newJobFormSchema>;

export const emptyNewJob: NewJobForm = {
  clientMode: 'new',
  clientId: '',
  clientName: '',
  clientEmail: '',
  clientPhone: '',
  propertyMode: 'new',
  propertyId: '',
  propertyName: '',
  address: '',
  accessNotes: '',
  name: '',
  existingSystem: false,
  notes: '',
};

const orNull = (text: string): string | null => (text === '' ? null : text);

/** A property is called by its address where nobody gave it a name: "4 Harrow Bank" of "4 Harrow Bank, Marlow Bend". */
const nameFromAddress = (address: string): string =>
  (address.split(/[,\n]/)[0] ?? address).trim().slice(0, 120);

/** What is sent for a valid form. */
export function newJobOf(form: NewJobForm): NewJob {
  return {
    name: form.name,
    client:
      form.clientMode === 'existing'
        ? { id: form.clientId }
        : { name: form.clientName, email: orNull(form.clientEmail), phone: orNull(form.clientPhone) },
    property:
      form.propertyMode === 'existing'
        ? { id: form.propertyId }
        : {
            name: form.propertyName === '' ? nameFromAddress(form.address) : form.propertyName,
            address: form.address,
            accessNotes: form.accessNotes,
          },
    existingSystem: form.existingSystem,
    notes: form.notes,
  };
}

const fields: Readonly<Record<string, string>> = {
  'client.id': 'clientId',
  'client.name': 'clientName',
  'client.email': 'clientEmail',
  'client.phone': 'clientPhone',
  'property.id': 'propertyId',
  'property.name': 'propertyName',
  'property.address': 'address',
  'property.accessNotes': 'accessNotes',
};

/** The form's own field for the server's name of it. */
export const newJobFieldOf = (name: string): string => fields[name] ?? name;
