import type { ReactNode } from 'react'
import { ThemeSwitch } from '../../components/theme-switch.tsx'
import { Wordmark } from '../../components/wordmark.tsx'
import { useDocumentTitle } from '../../lib/document-title.ts'
import { WeavePicture } from './weave-picture.tsx'

type AuthLayoutProps = { title: string; lead?: ReactNode; children: ReactNode }

/** Pages before sign-in: the picture of the work on one side, the form on the other. */
export function AuthLayout({ title, lead, children }: AuthLayoutProps) {
  useDocumentTitle(title)
  return (
    <div className="grid min-h-dvh md:grid-cols-[minmax(0,1.15fr)_minmax(26rem,1fr)]">
      <header className="flex flex-col justify-between gap-10 bg-band px-6 py-8 md:border-r md:border-hairline md:px-12 md:py-12">
        <Wordmark size="large" />
        <div className="hidden md:block">
          <WeavePicture />
        </div>
        <p className="max-w-[38ch] font-serif text-xl leading-snug md:text-2xl">
          Station logs in, statements out that can be checked line by line, down to the sound.
        </p>
      </header>
      <div className="flex flex-col px-6 py-8 md:px-14 md:py-12">
        <main className="my-auto grid w-full max-w-md gap-6">
          <div className="grid gap-2">
            <h1>{title}</h1>
            {lead !== undefined && <div className="text-slate">{lead}</div>}
          </div>
          {children}
        </main>
        <footer className="mt-10">
          <ThemeSwitch />
        </footer>
      </div>
    </div>
  )
}
