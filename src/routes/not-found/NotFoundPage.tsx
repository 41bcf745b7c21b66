import { useLocation } from 'react-router-dom'
import { ButtonLink } from '../../components/ui/Button.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'

export function NotFoundPage() {
  const { pathname } = useLocation()
  return (
    <>
      <PageHead title="No such page">
        Nothing stands at <code className="font-mono break-all">{pathname}</code>. It may have been deleted,
        or the address is mistyped.
      </PageHead>
      <ButtonLink to="/campaigns" kind="primary">
        To your campaigns
      </ButtonLink>
    </>
  )
}
