import { useEffect } from 'react'

/** Names the browser tab after the page. */
export function useDocumentTitle(title: string): void {
  useEffect(() => {
    document.title = `${title} · Fieldfare`
  }, [title])
}
