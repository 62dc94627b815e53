import type { Metadata, Viewport } from 'next';
import { connection } from 'next/server';
import type { ReactNode } from 'react';
import { ToastProvider } from '@/components/ui/toast';
import { hyperlegible, hyperlegibleExtended, hyperlegibleMono, newsreader, newsreaderExtended } from './fonts';
import './globals.css';

export const metadata: Metadata = {
  title: { default: 'Tidemark', template: '%s · Tidemark' },
  description: 'A research record of arm swelling and resistance training after breast cancer treatment.',
  robots: { index: false, follow: false },
};

export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: [
    { media: '(prefers-color-scheme: light)', color: '#f6f3ec' },
    { media: '(prefers-color-scheme: dark)', color: '#101a1b' },
  ],
};

/** Every route waits for its request: a page rendered beforehand has no nonce, and its scripts would be refused. */
export default async function RootLayout({ children }: Readonly<{ children: ReactNode }>) {
  await connection();
  return (
    <html lang="en-GB" className={[newsreader, newsreaderExtended, hyperlegible, hyperlegibleExtended, hyperlegibleMono].map(({ variable }) => variable).join(' ')}>
      <body>
        <a className="skip-link" href="#main">
          Skip to the main part
        </a>
        <ToastProvider>{children}</ToastProvider>
      </body>
    </html>
  );
}
