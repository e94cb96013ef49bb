import { useState } from "react"
import { Button } from "@/components/parts/button"
import { MarginNote } from "@/components/parts/note"
import { call, sentenceOf } from "@/lib/client/call"
import { signIn } from "@/lib/contracts/accounts"
import { Form, Threshold } from "./form"

interface DemoAccount {
  readonly name: string
  readonly email: string
  readonly words: string
  readonly password: string
}

/** The door: password, the institution's sign-in, and on one's own machine the demo's people. */
export function SignInPage({
  next,
  problem,
  institution,
  demo,
  mayRegister,
}: {
  /** Local path to go on to. */
  next: string
  problem: string | null
  institution: string | null
  demo: readonly DemoAccount[]
  mayRegister: boolean
}) {
  const [demoProblem, setDemoProblem] = useState<string | null>(null)
  const enter = async (email: string, password: string) => {
    await call(signIn, { body: { email, password } })
    location.assign(next)
  }
  return (
    <Threshold title="Sign in">
      {problem && <MarginNote weight="wrong">{problem}</MarginNote>}
      {demo.length > 0 && (
        <section className="grid gap-2 border-b border-hairline pb-6" aria-label="The demo's people">
          <p className="m-0 font-serif">This is your own machine. Enter as one of the demo’s people:</p>
          {demoProblem && <MarginNote weight="wrong">{demoProblem}</MarginNote>}
          {demo.map((person) => (
            <div key={person.email} className="flex flex-wrap items-baseline justify-between gap-x-4">
              <Button
                look="quiet"
                onPress={() =>
                  void enter(person.email, person.password).catch((error) =>
                    setDemoProblem(sentenceOf(error)),
                  )
                }
              >
                {person.name}
              </Button>
              <span className="text-small text-soft">{person.words}</span>
            </div>
          ))}
        </section>
      )}
      <Form
        fields={[
          { name: "email", label: "E-mail", type: "email", autoComplete: "username" },
          { name: "password", label: "Password", type: "password", autoComplete: "current-password" },
        ]}
        act="Sign in"
        onSend={({ email = "", password = "" }) => enter(email, password)}
      />
      <p className="m-0 flex flex-wrap gap-x-5 text-small">
        <a href="/password-reset" className="inline-block min-h-6">
          Forgotten password
        </a>
        {mayRegister && (
          <a href="/register" className="inline-block min-h-6">
            Open an account
          </a>
        )}
      </p>
      {institution && (
        <form method="post" action="/api/auth/signin/oidc" className="border-t border-hairline pt-6">
          <input type="hidden" name="callbackUrl" value={next} />
          <Button type="submit">Sign in through {institution}</Button>
        </form>
      )}
    </Threshold>
  )
}
