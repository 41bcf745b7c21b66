import { useEffect, useState, type FormEvent } from 'react'
import { useNavigate, useSearchParams } from 'react-router-dom'
import { setUpAccountSchema } from '../../../shared/session.ts'
import { explain } from '../../api/request.ts'
import { useSetUpAccount } from '../../api/session.ts'
import { EntrancePage } from '../../components/shell/EntrancePage.tsx'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { TextField } from '../../components/ui/Field.tsx'

/** Where the one-time link of a new account leads: /set-up?token=… */
export function SetUpPage() {
  const [search] = useSearchParams()
  const token = search.get('token') ?? ''
  const navigate = useNavigate()
  const setUp = useSetUpAccount()
  const [name, setName] = useState('')
  const [password, setPassword] = useState('')
  const [tried, setTried] = useState(false)
  useEffect(() => {
    document.title = 'Set up your account · Tessellary'
  }, [])

  const parsed = setUpAccountSchema.safeParse({ token, name, password })
  const faultOf = (field: string) =>
    tried && !parsed.success ? parsed.error.issues.find((issue) => issue.path[0] === field) : undefined

  if (token.length < 20) {
    return (
      <EntrancePage title="Set up your account">
        <p className="mb-4">
          This address has no complete one-time link in it. Open the whole link you were given, or ask the
          person who runs this installation for a new one.
        </p>
        <ButtonLink to="/sign-in">To sign-in</ButtonLink>
      </EntrancePage>
    )
  }

  const submit = (event: FormEvent) => {
    event.preventDefault()
    setTried(true)
    if (!parsed.success) return
    setUp.mutate(parsed.data, { onSuccess: () => void navigate('/campaigns', { replace: true }) })
  }

  return (
    <EntrancePage title="Set up your account">
      <form onSubmit={submit} noValidate className="flex flex-col gap-4">
        <TextField
          label="Name, as your team will see it"
          autoComplete="name"
          autoFocus
          value={name}
          onChange={(event) => setName(event.target.value)}
          error={faultOf('name') ? 'Enter a name of 1 to 80 characters.' : null}
        />
        <TextField
          label="Password"
          type="password"
          autoComplete="new-password"
          hint="At least 12 characters. A sentence is easier to remember than a puzzle."
          value={password}
          onChange={(event) => setPassword(event.target.value)}
          error={faultOf('password') ? `${password.length} characters so far; 12 are needed.` : null}
        />
        {setUp.isError && (
          <p role="alert" className="border-l-2 border-rejected pl-2">
            {explain(setUp.error)}
          </p>
        )}
        <Button kind="primary" type="submit" busy={setUp.isPending} className="self-start">
          Create the account
        </Button>
      </form>
    </EntrancePage>
  )
}
