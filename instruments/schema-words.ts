import { z } from 'zod';

/**
 * What a person reads where a schema says nothing of its own: the library's sentences speak of types. Loaded by both
 * edges (lib/web/problem.ts, components/api/form-problems.ts).
 */
z.config({
  customError: (issue) => {
    switch (issue.code) {
      case 'invalid_type':
        if (issue.input === undefined || issue.input === null || issue.input === '') return 'Fill this in.';
        return issue.expected === 'number' || issue.expected === 'int' ? 'Give a number.' : 'This is not what the field takes.';
      case 'too_big':
        return issue.origin === 'string' ? `Use at most ${issue.maximum} characters.` : issue.origin === 'array' ? `At most ${issue.maximum} are possible.` : `At most ${issue.maximum} is possible.`;
      case 'too_small':
        if (issue.origin === 'string') return Number(issue.minimum) <= 1 ? 'Fill this in.' : `Use at least ${issue.minimum} characters.`;
        return issue.origin === 'array' ? `At least ${issue.minimum} must be given.` : `At least ${issue.minimum} is needed.`;
      case 'not_multiple_of':
        return `Give steps of ${issue.divisor}.`;
      case 'invalid_value':
        return 'Choose one of what is offered.';
      case 'invalid_format':
        return 'This is not written as it should be.';
      case 'unrecognized_keys':
        return `Nothing here is called ${issue.keys.map((key) => `‘${key.slice(0, 40)}’`).join(', ')}.`;
      case 'invalid_union':
      case 'invalid_key':
      case 'invalid_element':
        return 'This is not what the field takes.';
      default:
        return undefined;
    }
  },
});
