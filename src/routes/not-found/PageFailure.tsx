import { isRouteErrorResponse, useRouteError } from 'react-router-dom'
import { explain } from '../../api/request.ts'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'

/** A page that broke while being drawn or could not be loaded. The rest of the application stays usable. */
export function PageFailure() {
  const error = useRouteError()
  const detail = isRouteErrorResponse(error) ? `${error.status} ${error.statusText}` : explain(error)
  const notLoaded = error instanceof TypeError && /import|module/i.test(error.message)
  return (
    <div role="alert" className="mx-auto max-w-[560px] px-4 pt-16">
      <h1 className="text-lg">This page could not be shown</h1>
      <p className="mt-2 text-soft">
        {notLoaded
          ? 'A part of the application could not be loaded. It may have been updated, or the connection was lost.'
          : 'A fault in the application itself. Nothing that was saved is lost.'}
      </p>
      <p className="mt-2 font-mono text-xs break-words">{detail}</p>
      <div className="mt-4 flex gap-2">
        <Button kind="primary" onClick={() => window.location.reload()}>
          Reload the page
        </Button>
        <ButtonLink to="/campaigns">To your campaigns</ButtonLink>
      </div>
    </div>
  )
}
