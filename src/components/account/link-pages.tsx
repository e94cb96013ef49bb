import { useEffect, useState } from "react"
import { Button } from "@/components/parts/button"
import { MarginNote } from "@/components/parts/note"
import { call, sentenceOf } from "@/lib/client/call"
import {
  confirmRegistration,
  register,
  requestPasswordReset,
  usePasswordReset as setPasswordByLink,
} from "@/lib/contracts/accounts"
import { acceptInvitation, lookAtInvitation } from "@/lib/contracts/people"
import { Form, Threshold } from "./form"

const newPassword = {
  name: "password",
  label: "New password",
  hint: "15 characters or more; a sentence is easy to keep. Any characters.",
  type: "password",
  autoComplete: "new-password",
} as const

export function RegisterPage() {
  return (
    <Threshold title="Open an account">
      <p className="m-0 font-serif">
        A mail brings you a link that proves the address; the password is chosen there. If a co-author has
        invited you, use the link of the invitation instead.
      </p>
      <Form
        fields={[
          { name: "name", label: "Name, as on a paper", autoComplete: "name" },
          { name: "email", label: "E-mail", type: "email", autoComplete: "email" },
        ]}
        act="Send the link"
        onSend={async ({ name = "", email = "" }) => {
          await call(register, { body: { name, email } })
          return `If ${email} has no account yet, a mail with the link is on its way.`
        }}
      />
    </Threshold>
  )
}

export function ConfirmPage({ token }: { token: string }) {
  return (
    <Threshold title="Choose a password">
      <Form
        fields={[newPassword]}
        act="Open the account"
        onSend={async ({ password = "" }) => {
          await call(confirmRegistration, { body: { token, password } })
          location.assign("/sign-in")
        }}
      />
    </Threshold>
  )
}

export function PasswordResetPage({ token }: { token: string | null }) {
  return (
    <Threshold title={token === null ? "Forgotten password" : "Choose a new password"}>
      {token === null ? (
        <Form
          fields={[{ name: "email", label: "E-mail", type: "email", autoComplete: "username" }]}
          act="Send a link"
          onSend={async ({ email = "" }) => {
            await call(requestPasswordReset, { body: { email } })
            return `If ${email} has an account, a mail with a link is on its way. The link works once, for an hour.`
          }}
        />
      ) : (
        <>
          <p className="m-0 font-serif">All browsers in which you are signed in will be signed out.</p>
          <Form
            fields={[newPassword]}
            act="Set the password"
            onSend={async ({ password = "" }) => {
              await call(setPasswordByLink, { body: { token, password } })
              location.assign("/sign-in")
            }}
          />
        </>
      )}
    </Threshold>
  )
}

interface Invitation {
  readonly manuscriptTitle: string
  readonly role: string
  readonly email: string
  readonly invitedBy: string
  readonly message: string
  readonly hasAccount: boolean
}

export function InvitationPage({ token, signedInAs }: { token: string; signedInAs: string | null }) {
  const [invitation, setInvitation] = useState<Invitation | null>(null)
  const [problem, setProblem] = useState<string | null>(null)
  useEffect(() => {
    call(lookAtInvitation, { body: { token } }).then(
      ({ data }) => setInvitation(data),
      (error: unknown) => setProblem(sentenceOf(error)),
    )
  }, [token])
  const accept = async (account?: { name: string; password: string }) => {
    const { data } = await call(acceptInvitation, { body: { token, ...(account ? { account } : {}) } })
    location.assign(
      signedInAs ? `/manuscripts/${data.manuscriptId}` : `/sign-in?next=/manuscripts/${data.manuscriptId}`,
    )
  }
  return (
    <Threshold title="Invitation">
      {problem && <MarginNote weight="wrong">{problem}</MarginNote>}
      {invitation && (
        <>
          <p className="m-0 font-serif">
            {invitation.invitedBy} invites {invitation.email} to “{invitation.manuscriptTitle}” as{" "}
            {invitation.role.replace("-", " ")}.
          </p>
          {invitation.message && (
            <blockquote className="m-0 border-l-2 border-rule pl-3 font-serif italic">
              {invitation.message}
            </blockquote>
          )}
          {signedInAs ? (
            <div>
              <Button
                look="act"
                onPress={() => void accept().catch((error: unknown) => setProblem(sentenceOf(error)))}
              >
                Accept as {signedInAs}
              </Button>
            </div>
          ) : invitation.hasAccount ? (
            <p className="m-0">
              <a href={`/sign-in?next=${encodeURIComponent(`/invitation?token=${token}`)}`}>
                Sign in to accept
              </a>
            </p>
          ) : (
            <Form
              fields={[{ name: "name", label: "Name, as on a paper", autoComplete: "name" }, newPassword]}
              act="Open an account and accept"
              onSend={({ name = "", password = "" }) => accept({ name, password })}
            />
          )}
        </>
      )}
    </Threshold>
  )
}
