// @vitest-environment jsdom
import { type Schedule, scheduleSchema, usualSchedule } from '@lampwright/geometry/plan';
import { Theme } from '@radix-ui/themes';
import { cleanup, fireEvent, render, screen, waitFor } from '@testing-library/react';
import { useState } from 'react';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { Form, useZodForm } from '../form';
import { OwnScheduleControl, ScheduleControl, ScheduleField } from '.';

afterEach(cleanup);

const choose = (label: string, moment: string) =>
  fireEvent.change(screen.getByRole('combobox', { name: label }), { target: { value: moment } });
const minutes = (label: string) => screen.getByLabelText<HTMLInputElement>(`${label}: minutes`);
const time = (label: string) => screen.getByLabelText<HTMLInputElement>(`${label}: time`);

function Control({ commit }: { commit: (schedule: Schedule) => void }) {
  const [value, setValue] = useState(usualSchedule);
  return (
    <Theme>
      <ScheduleControl
        label="Lights are on"
        value={value}
        commit={(next) => {
          commit(next);
          setValue(next);
        }}
      />
      <button type="button" onClick={() => setValue(usualSchedule)}>
        Undo
      </button>
    </Theme>
  );
}

function TestForm({ send }: { send: (values: { schedule: Schedule }) => Promise<void> }) {
  const form = useZodForm(z.object({ schedule: scheduleSchema }), {
    defaultValues: { schedule: usualSchedule },
  });
  return (
    <Form form={form} label="Test" submitLabel="Send" onSubmit={send}>
      <ScheduleField control={form.control} name="schedule" label="Lights are on" />
    </Form>
  );
}

describe('a schedule whose changes count at once', () => {
  it('is told in words, and counts each choice once', () => {
    const commit = vi.fn();
    render(<Control commit={commit} />);
    screen.getByText('From sunset until 23:00.');
    choose('On', 'sunset-after');
    expect(commit.mock.calls).toEqual([[{ ...usualSchedule, on: { kind: 'sunset', minutesAfter: 30 } }]]);
    screen.getByText('From 30 minutes after sunset until 23:00.');
    choose('Off', 'sunrise-at');
    expect(commit).toHaveBeenCalledTimes(2);
    screen.getByText('From 30 minutes after sunset until sunrise.');
  });

  it('counts what is typed when it is left, not letter by letter, and never what is wrong', () => {
    const commit = vi.fn();
    render(<Control commit={commit} />);
    choose('On', 'sunset-before');
    commit.mockClear();
    fireEvent.change(minutes('On'), { target: { value: '4' } });
    fireEvent.change(minutes('On'), { target: { value: '45' } });
    expect(commit).not.toHaveBeenCalled();
    fireEvent.blur(minutes('On'));
    fireEvent.blur(minutes('On'));
    expect(commit.mock.calls).toEqual([[{ ...usualSchedule, on: { kind: 'sunset', minutesAfter: -45 } }]]);
    fireEvent.change(minutes('On'), { target: { value: 'soon' } });
    fireEvent.blur(minutes('On'));
    expect(commit).toHaveBeenCalledTimes(1);
    const fault = screen.getByText('Please write a number, such as 12 or 12.5.');
    expect(minutes('On').getAttribute('aria-invalid')).toBe('true');
    expect(minutes('On').getAttribute('aria-describedby')).toBe(fault.id);
  });

  it('shows what others make of it, in place of what was typed', () => {
    render(<Control commit={() => {}} />);
    fireEvent.change(time('Off'), { target: { value: '21:30' } });
    fireEvent.blur(time('Off'));
    screen.getByText('From sunset until 21:30.');
    fireEvent.click(screen.getByRole('button', { name: 'Undo' }));
    expect(time('Off').value).toBe('23:00');
  });

  it('says when its clock times never light', () => {
    render(<Control commit={() => {}} />);
    choose('On', 'clock');
    fireEvent.change(time('On'), { target: { value: '01:00' } });
    screen.getByText(/the lights stay off/);
    fireEvent.change(time('On'), { target: { value: '22:00' } });
    expect(screen.queryByText(/the lights stay off/)).toBeNull();
  });
});

it('is the usual one until it gets its own', () => {
  const commit = vi.fn();
  render(
    <Theme>
      <OwnScheduleControl
        label="On"
        usual={usualSchedule}
        usualLabel="As the plan"
        value={null}
        commit={commit}
      />
    </Theme>,
  );
  screen.getByText('From sunset until 23:00.');
  fireEvent.click(screen.getByRole('radio', { name: 'Its own' }));
  expect(commit).toHaveBeenCalledWith(usualSchedule);
});

it('is sent by a form only when it is right', async () => {
  const send = vi.fn(async (_values: { schedule: Schedule }) => {});
  render(
    <Theme>
      <TestForm send={send} />
    </Theme>,
  );
  fireEvent.change(time('Off'), { target: { value: '' } });
  fireEvent.click(screen.getByRole('button', { name: 'Send' }));
  await screen.findByText(/A time of day is written as HH:MM/);
  expect(send).not.toHaveBeenCalled();
  fireEvent.change(time('Off'), { target: { value: '22:15' } });
  fireEvent.click(screen.getByRole('button', { name: 'Send' }));
  await waitFor(() => expect(send).toHaveBeenCalled());
  expect(send.mock.calls[0]?.[0].schedule.off).toEqual({ kind: 'clock', at: '22:15' });
});
