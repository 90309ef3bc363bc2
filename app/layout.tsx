import type { Metadata, Viewport } from 'next';
import localFont from 'next/font/local';
import { cookies } from 'next/headers';
import { connection } from 'next/server';
import type { ReactNode } from 'react';
import { parseTheme, THEME_COOKIE } from '@/components/shell/theme';
import { ToastProvider } from '@/components/ui/toast';
import './globals.css';

const sans = localFont({
  src: '../public/fonts/source-sans-3.woff2',
  weight: '200 900',
  variable: '--font-sans',
});
const mono = localFont({
  src: '../public/fonts/jetbrains-mono.woff2',
  weight: '100 800',
  variable: '--font-mono',
});

export const metadata: Metadata = {
  title: { default: 'Pinloom', template: '%s · Pinloom' },
  description:
    'Draw a kernel, place it on a reconfigurable array, see the mapping and decide on it together.',
};

export const viewport: Viewport = { width: 'device-width', initialScale: 1 };

export default async function RootLayout({ children }: { children: ReactNode }) {
  // The security policy's nonce is new for each request, so no page may be rendered ahead of it.
  await connection();
  const theme = parseTheme((await cookies()).get(THEME_COOKIE)?.value);
  return (
    <html
      lang="en"
      className={`${sans.variable} ${mono.variable}`}
      data-theme={theme === 'system' ? undefined : theme}
    >
      <body>
        <ToastProvider>{children}</ToastProvider>
      </body>
    </html>
  );
}
