import { StandardSchemaValidationPipe } from '@nestjs/common';
import { badInput, type FieldFault } from './app-error.js';
import { jsonPointer } from './pointer.js';

const MOST_FAULTS_LISTED = 200;

interface Issue {
  readonly message: string;
  readonly path?: readonly (PropertyKey | { readonly key: PropertyKey })[] | undefined;
  readonly code?: string;
  readonly keys?: readonly string[];
}

function faultsOf(issue: Issue): FieldFault[] {
  const path = (issue.path ?? []).map((segment) => (typeof segment === 'object' ? segment.key : segment));
  if (issue.code === 'unrecognized_keys' && issue.keys)
    return issue.keys.map((key) => ({
      pointer: jsonPointer([...path, key]),
      detail: `There is no field called ${JSON.stringify(key)} here.`,
    }));
  return [{ pointer: jsonPointer(path), detail: issue.message }];
}

/** Parses every `schema` given to @Body, @Query and @Param; faults become 400 with a pointer each. */
export const validationPipe = () =>
  new StandardSchemaValidationPipe({
    exceptionFactory: (issues) => {
      const faults = issues.flatMap((issue) => faultsOf(issue as Issue));
      const listed = faults.slice(0, MOST_FAULTS_LISTED);
      if (faults.length > listed.length)
        listed.push({ pointer: '', detail: `and ${faults.length - listed.length} more.` });
      return badInput(listed);
    },
  });
