import type { Metadata } from 'next';
import { NarrowPage } from '../_components/narrow-page';
import { ForgotForm } from './forgot-form';

export const metadata: Metadata = { title: 'Set a new password' };

export default function ForgotPage() {
  return (
    <NarrowPage title="Set a new password" lead="We mail you a link. It works once, for an hour.">
      <ForgotForm />
    </NarrowPage>
  );
}
