import { LoadingState } from '../components/states.tsx'

/** Seen for the moment between the first paint and the first page. */
export function StartingPage() {
  return (
    <div className="grid min-h-dvh place-items-center">
      <LoadingState>Opening Fieldfare</LoadingState>
    </div>
  )
}
