/** Loose on purpose: only the mail that arrives proves an address. */
export const emailRules = {
  required: 'Write your e-mail address.',
  pattern: {
    value: /^\s*[^\s@]+@[^\s@]+\.[^\s@]+\s*$/,
    message: 'Write the address like name@firm.example.',
  },
  maxLength: { value: 254, message: 'This address is longer than mail allows (254 characters).' },
};
