import { useEffect, useState, type FormEvent } from 'react'
import { useQueryClient } from '@tanstack/react-query'
import { Navigate, useSearchParams } from 'react-router-dom'
import { signInSchema } from '../../../shared/session.ts'
import { explain } from '../../api/request.ts'
import { forgetEverything, useSession, useSignIn } from '../../api/session.ts'
import { EntrancePage } from '../../components/shell/EntrancePage.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { TextField } from '../../components/ui/Field.tsx'

/** Only addresses inside the application are followed after sign-in. */
export function safeDestination(then: string | null): string {
  return then && /^\/(?![/\\])/.test(then) ? then : '/campaigns'
}

export function SignInPage() {
  const session = useSession()
  const signIn = useSignIn()
  const [search] = useSearchParams()
  const [email, setEmail] = useState('')
  const [password, setPassword] = useState('')
  const [problem, setProblem] = useState<string | null>(null)
  const client = useQueryClient()
  useEffect(() => {
    document.title = 'Sign in · Tessellary'
    forgetEverything(client)
  }, [client])
  if (session.data?.account) return <Navigate to={safeDestination(search.get('then'))} replace />

  const submit = (event: FormEvent) => {
    event.preventDefault()
    const parsed = signInSchema.safeParse({ email: email.trim(), password })
    if (!parsed.success) {
      setProblem('Enter the e-mail address of your account and its password.')
      return
    }
    setProblem(null)
    signIn.mutate(parsed.data, { onError: (error) => setProblem(explain(error)) })
  }

  return (
    <EntrancePage title="Sign in">
      <form onSubmit={submit} noValidate className="flex flex-col gap-4">
        <TextField
          label="E-mail address"
          type="email"
          name="email"
          autoComplete="username"
          autoFocus
          required
          value={email}
          onChange={(event) => setEmail(event.target.value)}
        />
        <TextField
          label="Password"
          type="password"
          name="password"
          autoComplete="current-password"
          required
          value={password}
          onChange={(event) => setPassword(event.target.value)}
        />
        {problem && (
          <p role="alert" className="border-l-2 border-rejected pl-2">
            {problem}
          </p>
        )}
        <Button kind="primary" type="submit" busy={signIn.isPending} className="self-start">
          {signIn.isPending ? 'Signing in…' : 'Sign in'}
        </Button>
      </form>
      <p className="mt-6 text-xs text-soft">
        Accounts are made by the person who runs this installation; a new account starts from a one-time link.
      </p>
    </EntrancePage>
  )
}
