/** Checks made in the page speak from the catalogue, not from the checking library. */
import { z } from 'zod';
import { words } from '../words/en.ts';

z.config({
  customError: (issue) => {
    const { form } = words;
    if (issue.input === undefined || issue.input === null || issue.input === '') {
      return issue.code === 'invalid_value' ? form.chooseOne : form.required;
    }
    switch (issue.code) {
      case 'too_small':
        if (issue.origin !== 'string') return form.tooSmall(String(issue.minimum));
        return issue.minimum === 1 ? form.required : form.tooShort(Number(issue.minimum));
      case 'too_big':
        return issue.origin === 'string'
          ? form.tooLong(Number(issue.maximum))
          : form.tooLarge(String(issue.maximum));
      case 'invalid_format':
        return issue.format === 'email' ? form.notAnAddress : form.invalid;
      case 'invalid_value':
        return form.chooseOne;
      default:
        return form.invalid;
    }
  },
});
