import { roleLabels } from '@fieldfare/contracts'
import { DefinitionList } from '../../components/definition-list.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { ThemeSwitch } from '../../components/theme-switch.tsx'
import { useSession } from '../../lib/session.ts'
import { ChangePassword } from './change-password.tsx'
import { MySessions } from './my-sessions.tsx'

export function AccountPage() {
  const { user, society } = useSession()
  return (
    <>
      <PageHeader
        title="Account"
        lead="Who you are here, how the pages look, your password and your open sessions."
      />
      <Section title="You">
        <DefinitionList
          items={[
            { term: 'Name', value: user.name },
            { term: 'E-mail address', value: user.email },
            { term: 'Role', value: `${roleLabels[user.role]} at ${society.name}` },
            user.stations.length === 0
              ? null
              : { term: 'Stations', value: user.stations.map((station) => station.name).join(', ') },
            user.parties.length === 0
              ? null
              : { term: 'Interested parties', value: user.parties.map((party) => party.name).join(', ') },
          ]}
        />
      </Section>
      <Section title="Light or dark" lead="Remembered on this device. Dark suits a logging room at night.">
        <ThemeSwitch />
      </Section>
      <Section title="Password" lead="Your other sessions end when it changes.">
        <ChangePassword />
      </Section>
      <Section title="Open sessions" lead="End any you do not know, then change your password.">
        <MySessions />
      </Section>
    </>
  )
}
