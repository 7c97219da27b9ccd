import { base32 } from '@better-auth/utils/base32';
import { createOTP } from '@better-auth/utils/otp';

/** An authenticator as on a telephone, set up by what the product shows: a code of now, or of steps away from now. */
export function authenticator(totpUri: string) {
  const shown = new URL(totpUri);
  const secret = new TextDecoder().decode(base32.decode(shown.searchParams.get('secret')!));
  const otp = createOTP(secret, { digits: 6, period: 30 });
  return {
    issuer: shown.searchParams.get('issuer'),
    code: (steps = 0) => otp.hotp(Math.floor(Date.now() / 30_000) + steps),
  };
}
