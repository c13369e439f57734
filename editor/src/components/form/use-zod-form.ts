import { zodResolver } from '@hookform/resolvers/zod';
import { type DefaultValues, type FieldValues, type UseFormReturn, useForm } from 'react-hook-form';
import type { z } from 'zod';
import { sentenceFor } from '../../lib/zod-sentences';

export type ZodForm<In extends FieldValues, Out> = UseFormReturn<In, unknown, Out>;

interface Options<In extends FieldValues> {
  readonly defaultValues: DefaultValues<In>;
}

/** A form whose answers are what the schema says; each field is checked when it is left, then as it is typed. */
export function useZodForm<In extends FieldValues, Out>(
  schema: z.ZodType<Out, In>,
  { defaultValues }: Options<In>,
): ZodForm<In, Out> {
  return useForm<In, unknown, Out>({
    resolver: zodResolver(schema, { error: (issue) => sentenceFor(issue as z.core.$ZodRawIssue) ?? null }),
    mode: 'onTouched',
    defaultValues,
  });
}
