import { passwordLimits } from './password-field';

const { min, max } = passwordLimits;

/** NIST SP 800-63B-4: length counts, in characters of any script; composition does not. The server also knows lists. */
export const newPasswordRules = {
  required: 'Write a password.',
  validate: (password: string) => {
    const length = [...password.normalize('NFC')].length;
    if (length < min) return `Use ${min} characters or more.`;
    return length <= max || `Use ${max} characters or fewer.`;
  },
};

export const newPasswordHelp = `${min} characters or more. A few unrelated words are good; nothing else is asked of it, only common passwords and your own name are refused.`;
