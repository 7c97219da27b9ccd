import type { Metadata, Viewport } from 'next';
import { headers } from 'next/headers';
import { connection } from 'next/server';
import type { ReactNode } from 'react';
import { colours } from '@/tailwind.config';
import { Providers } from './_components/providers';
import { readPreferences } from './_components/read-preferences';
import { extendedFace, figureFace, italicFace, textFace } from './fonts/faces';
import './globals.css';

export const metadata: Metadata = {
  title: { default: 'Firstpull', template: '%s · Firstpull' },
  description: 'Agree the template before it is printed, and get the first pull right.',
  applicationName: 'Firstpull',
  icons: {
    icon: [
      { url: '/icon.svg', type: 'image/svg+xml' },
      { url: '/favicon.ico', sizes: '32x32' },
    ],
    apple: '/apple-touch-icon.png',
  },
  formatDetection: { telephone: false, address: false, email: false },
};

export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: [
    { media: '(prefers-color-scheme: light)', color: colours.light.paper },
    { media: '(prefers-color-scheme: dark)', color: colours.dark.paper },
  ],
};

const faces = [textFace, italicFace, extendedFace, figureFace].map((face) => face.variable).join(' ');

/** When this request is being answered; relative times on the page are counted from here until it hydrates. */
async function requestTime(): Promise<number> {
  await connection();
  return Date.now();
}

export default async function RootLayout({ children }: { children: ReactNode }) {
  const [preferences, renderedAt] = await Promise.all([readPreferences(), requestTime()]);
  // Parts that add a style element of their own put this page's nonce on it (see page-nonce.ts).
  const nonce = (await headers()).get('x-nonce') ?? undefined;
  return (
    <html lang="en" data-theme={preferences.theme} className={faces}>
      <head>
        <meta property="csp-nonce" nonce={nonce} />
      </head>
      <body>
        <Providers preferences={preferences} renderedAt={renderedAt}>
          {children}
        </Providers>
      </body>
    </html>
  );
}
