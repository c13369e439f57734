import { describe, expect, it } from 'vitest';
import { openQuestions, type Question, waitingQuestions } from './affairs';

type Side = Question['messages'][number]['side'];

const asked = (id: string, sides: readonly Side[], resolvedAt: string | null = null) =>
  ({ id, resolvedAt, messages: sides.map((side) => ({ side })) }) as unknown as Question;

describe('questions', () => {
  const all = [
    asked('new', ['homeowner']),
    asked('answered', ['homeowner', 'company']),
    asked('asked on', ['homeowner', 'company', 'homeowner']),
    asked('settled without an answer', ['homeowner'], '2026-05-03T10:00:00.000Z'),
  ];

  it('are open until somebody settles them, and wait only while the client has the last word', () => {
    expect(openQuestions(all).map(({ id }) => id)).toEqual(['new', 'answered', 'asked on']);
    expect(waitingQuestions(all).map(({ id }) => id)).toEqual(['new', 'asked on']);
  });
});
