// @vitest-environment jsdom
import { Theme } from '@radix-ui/themes';
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, fireEvent, render, screen, waitFor } from '@testing-library/react';
import type { ReactNode } from 'react';
import { afterEach, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { ApiProblem } from '../../lib/api/client';
import { type Me, meKey } from '../../lib/me';
import { Form, LengthField, NumberField, TextField, useZodForm } from '.';

afterEach(cleanup);

const schema = z.object({
  name: z.string().min(1),
  volts: z.number().positive().max(60),
  slack: z.number().min(0).nullable(),
});
type Values = z.infer<typeof schema>;

interface TestFormProps {
  readonly send: (values: Values) => Promise<void>;
  readonly start?: Values;
}

function TestForm({ send, start = { name: '', volts: 12, slack: null } }: TestFormProps) {
  const form = useZodForm(schema, { defaultValues: start });
  return (
    <Form form={form} label="Test" submitLabel="Send" onSubmit={send}>
      <TextField control={form.control} name="name" label="Name" />
      <NumberField control={form.control} name="volts" label="Volts" unit="V" />
      <LengthField control={form.control} name="slack" label="Slack" optional />
    </Form>
  );
}

const me: Me = {
  user: {
    id: 'u',
    name: 'Ines Marlow',
    email: 'designer@fernhollow.example',
    preferences: { units: 'imperial', theme: 'light' },
  },
  company: null,
  role: null,
  companies: [],
};

function show(form: ReactNode) {
  const client = new QueryClient();
  client.setQueryData(meKey, me);
  render(
    <QueryClientProvider client={client}>
      <Theme>{form}</Theme>
    </QueryClientProvider>,
  );
}

const field = (name: RegExp) => screen.getByRole<HTMLInputElement>('textbox', { name });
const type = (name: RegExp, value: string) => fireEvent.change(field(name), { target: { value } });
const press = () => fireEvent.click(screen.getByRole('button', { name: 'Send' }));

it('does not send what is wrong, and says so at the field, for a screen reader too', async () => {
  const send = vi.fn(async () => {});
  show(<TestForm send={send} />);
  press();
  const error = await screen.findByText('Please fill this in.');
  expect(field(/Name/).getAttribute('aria-invalid')).toBe('true');
  expect(field(/Name/).getAttribute('aria-describedby')).toBe(error.id);
  expect(document.activeElement).toBe(field(/Name/));
  expect(send).not.toHaveBeenCalled();
});

it('keeps a number as it is typed, and sends what it means', async () => {
  const send = vi.fn(async (_values: Values) => {});
  show(<TestForm send={send} />);
  type(/Name/, 'P1');
  type(/Volts/, '12.');
  expect(field(/Volts/).value).toBe('12.');
  type(/Volts/, '12,50');
  expect(field(/Volts/).value).toBe('12,50');
  press();
  await waitFor(() => expect(send).toHaveBeenCalled());
  expect(send.mock.calls[0]?.[0]).toEqual({ name: 'P1', volts: 12.5, slack: null });
});

it('tells a missing number from one that is none', async () => {
  show(<TestForm send={async () => {}} />);
  type(/Volts/, '');
  press();
  await screen.findByText('Please fill in a number.');
  type(/Volts/, 'twelve');
  await screen.findByText('Please write a number, such as 12 or 12.5.');
});

it('reads a length in any unit and keeps it in metres', async () => {
  const send = vi.fn(async (_values: Values) => {});
  show(<TestForm send={send} start={{ name: 'P1', volts: 12, slack: 0.3048 }} />);
  expect(field(/Slack/).value).toBe('1′ 0″');
  type(/Slack/, '2 ft 6 in');
  press();
  await waitFor(() => expect(send).toHaveBeenCalled());
  expect(send.mock.calls[0]?.[0].slack).toBeCloseTo(0.762, 9);
});

it('says what a length may look like', async () => {
  show(<TestForm send={async () => {}} />);
  type(/Slack/, 'a bit');
  press();
  expect((await screen.findByText(/is not a length/)).textContent).toMatch(/3\.81 m/);
});

it('shows the server’s fault at the field that it names', async () => {
  show(
    <TestForm
      start={{ name: 'P1', volts: 12, slack: null }}
      send={async () => {
        throw new ApiProblem(400, 'bad-input', 'Some values need attention.', [
          { pointer: '/name', detail: 'This name is taken.' },
        ]);
      }}
    />,
  );
  press();
  await screen.findByText('This name is taken.');
  expect(screen.queryByRole('alert')).toBeNull();
  expect(field(/Name/).getAttribute('aria-invalid')).toBe('true');
});

it('shows what fits no field above the button, and lets one try again', async () => {
  let tries = 0;
  show(
    <TestForm
      start={{ name: 'P1', volts: 12, slack: null }}
      send={async () => {
        tries += 1;
        if (tries === 1) throw new ApiProblem(503, 'not-available', 'Not available at the moment.');
      }}
    />,
  );
  press();
  expect((await screen.findByRole('alert')).textContent).toContain('Not available at the moment.');
  press();
  await waitFor(() => expect(screen.queryByRole('alert')).toBeNull());
  expect(tries).toBe(2);
});

it('takes one press while it is sending', async () => {
  let release = () => {};
  const send = vi.fn(
    () =>
      new Promise<void>((resolve) => {
        release = resolve;
      }),
  );
  show(<TestForm send={send} start={{ name: 'P1', volts: 12, slack: null }} />);
  press();
  await waitFor(() =>
    expect(screen.getByRole('button', { name: 'Send' }).getAttribute('aria-busy')).toBe('true'),
  );
  press();
  release();
  await waitFor(() =>
    expect(screen.getByRole('button', { name: 'Send' }).getAttribute('aria-busy')).toBeNull(),
  );
  expect(send).toHaveBeenCalledTimes(1);
});
