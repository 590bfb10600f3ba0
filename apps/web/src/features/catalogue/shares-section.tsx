import { rightLabels, type Right, type ShareSet } from '@fieldfare/contracts'
import { Pencil } from 'lucide-react'
import { useState } from 'react'
import { Button } from '../../components/button.tsx'
import { Section } from '../../components/page-header.tsx'
import { EmptyState } from '../../components/states.tsx'
import { showToast } from '../../lib/toasts.ts'
import { ClaimedSentence } from './claimed-today.tsx'
import { SharesEditor, type SharesRequest } from './shares-editor.tsx'
import { SharesTable } from './shares-table.tsx'

type SharesSectionProps = {
  right: Right
  shares: ShareSet
  canEdit: boolean
  onSave: (body: SharesRequest) => Promise<void>
}

/** Who is paid for one right, and the editor of it for those who keep the catalogue. */
export function SharesSection({ right, shares, canEdit, onSave }: SharesSectionProps) {
  const [isEditing, setIsEditing] = useState(false)
  const title = `Shares in ${right === 'works' ? 'the work' : 'the recording'}`
  if (isEditing) {
    return (
      <Section
        title={title}
        lead="A month that is calculated keeps the shares it was calculated with; open months use what is saved here."
      >
        <SharesEditor
          present={shares.items}
          onCancel={() => setIsEditing(false)}
          onSave={async (body) => {
            await onSave(body)
            setIsEditing(false)
            showToast('The shares are saved.')
          }}
        />
      </Section>
    )
  }
  return (
    <Section
      title={title}
      lead={
        <>
          {rightLabels[right]} right. <ClaimedSentence ppm={shares.totalTodayPpm} />
        </>
      }
      actions={
        canEdit && (
          <Button icon={Pencil} onClick={() => setIsEditing(true)}>
            Change the shares
          </Button>
        )
      }
    >
      {shares.items.length === 0 ? (
        <EmptyState title="No shares yet">
          {canEdit
            ? 'Until somebody holds a share, all the money for this right is held back. Change the shares to add the first.'
            : 'Until somebody holds a share, all the money for this right is held back.'}
        </EmptyState>
      ) : (
        <SharesTable shares={shares} caption={title} />
      )}
    </Section>
  )
}
