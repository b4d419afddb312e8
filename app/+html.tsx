import type { PropsWithChildren } from 'react';
import { stylesheet, themeScript } from '@/components/theme/stylesheet.ts';
import { light, night } from '@/components/theme/tokens.ts';

/** The neutral shell of every exported page: both palettes, no person, no width, no theme. */
export default function Html({ children }: PropsWithChildren) {
  return (
    <html lang="en">
      <head>
        <meta charSet="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1, viewport-fit=cover" />
        <meta name="theme-color" media="(prefers-color-scheme: light)" content={light.ground} />
        <meta name="theme-color" media="(prefers-color-scheme: dark)" content={night.ground} />
        <meta
          name="description"
          content="Staged pierces and corners for thick plate, approved and found again at the machine."
        />
        <link rel="icon" href="/favicon.ico" sizes="32x32" />
        <link rel="icon" href="/icon.svg" type="image/svg+xml" />
        <link rel="apple-touch-icon" href="/apple-touch-icon.png" />
        <link rel="manifest" href="/manifest.webmanifest" />
        <style dangerouslySetInnerHTML={{ __html: stylesheet }} />
        <script dangerouslySetInnerHTML={{ __html: themeScript }} />
      </head>
      <body>{children}</body>
    </html>
  );
}
