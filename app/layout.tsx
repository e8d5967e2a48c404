import type { Metadata, Viewport } from 'next'
import { cookies } from 'next/headers'
import { connection } from 'next/server'
import type { ReactNode } from 'react'
import { hyper, hyperExtended, hyperMono } from '@/app/fonts'
import { viewer as currentViewer } from '@/app/viewer'
import { isDemo } from '@/app/mode'
import { Footer } from '@/components/shell/footer'
import { Header } from '@/components/shell/header'
import { parseTheme, parseUnits, THEME_COOKIE, UNITS_COOKIE } from '@/components/shell/preferences'
import { UnitsProvider } from '@/components/shell/units-context'
import './globals.css'

export const metadata: Metadata = {
  title: { default: 'Middlewatch', template: '%s · Middlewatch' },
  description: 'Knows before the night whether the toilet pump will run, and where the air gets in.',
  manifest: '/manifest.webmanifest',
  icons: { icon: '/mark.svg' },
}
export const viewport: Viewport = {
  width: 'device-width',
  initialScale: 1,
  themeColor: [
    { media: '(prefers-color-scheme: light)', color: '#ffffff' },
    { media: '(prefers-color-scheme: dark)', color: '#0a151b' },
  ],
}

export default async function RootLayout({ children }: { children: ReactNode }) {
  // Scripts carry a nonce made for each request, so no page may be drawn ahead of one.
  await connection()
  const jar = await cookies()
  const theme = parseTheme(jar.get(THEME_COOKIE)?.value)
  const viewer = await currentViewer()
  return (
    <html
      lang="en"
      data-theme={theme === 'system' ? undefined : theme}
      className={`${hyper.variable} ${hyperExtended.variable} ${hyperMono.variable}`}
    >
      <body className="flex flex-col">
        <a href="#sheet" className="absolute -top-20 left-4 z-10 bg-water p-3 focus:top-2">
          Skip to the sheet
        </a>
        <UnitsProvider initial={parseUnits(jar.get(UNITS_COOKIE)?.value)}>
          <Header viewer={viewer} theme={theme} demo={isDemo()} />
          <main id="sheet" tabIndex={-1} className="flex-1 pb-10 outline-none">
            {children}
          </main>
          <Footer theme={theme} />
        </UnitsProvider>
      </body>
    </html>
  )
}
