import { passwordLimits } from './password-field';

/** NIST SP 800-63B-4: length counts, composition does not. */
export const newPasswordRules = {
  required: 'Write a password.',
  minLength: { value: passwordLimits.min, message: `Use ${passwordLimits.min} characters or more.` },
  maxLength: { value: passwordLimits.max, message: `Use ${passwordLimits.max} characters or fewer.` },
};

export const newPasswordHelp = `${passwordLimits.min} characters or more. A few unrelated words are good; nothing else is asked of it.`;
