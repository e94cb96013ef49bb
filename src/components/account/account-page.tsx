import { useQuery, useQueryClient } from "@tanstack/react-query"
import { useState } from "react"
import { Button } from "@/components/parts/button"
import { Select } from "@/components/parts/field"
import { Ledger } from "@/components/parts/ledger"
import { MarginNote } from "@/components/parts/note"
import { When } from "@/components/parts/when"
import { call } from "@/lib/client/call"
import { Island } from "@/lib/client/island"
import {
  changeMe,
  changePassword,
  createToken,
  listSignIns,
  listTokens,
  revokeSignIn,
  revokeToken,
  signOut,
  signOutEverywhere,
} from "@/lib/contracts/accounts"
import { Form } from "./form"

interface Me {
  readonly name: string
  readonly email: string
  readonly orcid: string | null
  readonly hasPassword: boolean
}

/** One's account: name, password, where one is signed in, tokens. */
export function AccountPage({ me }: { me: Me }) {
  return (
    <Island>
      <div className="sheet">
        <div className="grid content-start gap-10">
          <header className="flex flex-wrap items-baseline justify-between gap-4">
            <h1 className="m-0 text-title">{me.name}</h1>
            <Button onPress={() => void leave(() => call(signOut))}>Sign out</Button>
          </header>
          <Tokens />
          <SignIns />
        </div>
        <aside className="grid content-start gap-8" aria-label="Profile and password">
          <section className="grid gap-3">
            <h2 className="label m-0">Profile</h2>
            <Form
              look="plain"
              fields={[
                { name: "name", label: "Name", initial: me.name, autoComplete: "name" },
                { name: "orcid", label: "ORCID iD", hint: "Empty for none.", initial: me.orcid ?? "" },
              ]}
              act="Save profile"
              onSend={async ({ name = "", orcid = "" }) => {
                await call(changeMe, { body: { name, orcid: orcid.trim() || null } })
                return "Saved."
              }}
            />
          </section>
          <section className="grid gap-3">
            <h2 className="label m-0">Password</h2>
            <Form
              look="plain"
              fields={[
                ...(me.hasPassword
                  ? [
                      {
                        name: "current",
                        label: "Present password",
                        type: "password",
                        autoComplete: "current-password",
                      },
                    ]
                  : []),
                {
                  name: "next",
                  label: "New password",
                  hint: "15 characters or more.",
                  type: "password",
                  autoComplete: "new-password",
                },
              ]}
              act="Change password"
              onSend={async ({ current, next = "" }) => {
                await call(changePassword, { body: { current: current ?? null, next } })
                return "Changed. All other browsers are signed out."
              }}
            />
          </section>
        </aside>
      </div>
    </Island>
  )
}

async function leave(doing: () => Promise<unknown>): Promise<void> {
  await doing()
  location.assign("/sign-in")
}

function Tokens() {
  const client = useQueryClient()
  const { data = [] } = useQuery({
    queryKey: ["tokens"],
    queryFn: async () => (await call(listTokens)).data.items,
  })
  const [scope, setScope] = useState<"read" | "upload" | "all">("upload")
  const [secret, setSecret] = useState<string | null>(null)
  const refresh = () => client.invalidateQueries({ queryKey: ["tokens"] })
  return (
    <section className="grid gap-3">
      <h2 className="m-0 text-lead">Tokens</h2>
      <p className="measure m-0 text-soft">
        For scripts and clusters: <code>Authorization: Bearer …</code>. Whoever has a token acts as you,
        within its scope.
      </p>
      {secret && (
        <MarginNote weight="caution">
          Copy it now, it is not shown again:{" "}
          <code className="break-all" data-token>
            {secret}
          </code>
        </MarginNote>
      )}
      <Ledger
        caption="Tokens"
        rows={data}
        rowKey={(token) => token.id}
        empty={<p className="m-0 text-soft">No token.</p>}
        columns={[
          { key: "name", heading: "Name", cell: (token) => token.name },
          { key: "scope", heading: "Scope", cell: (token) => token.scope },
          { key: "prefix", heading: "Begins", wideOnly: true, cell: (token) => <code>{token.prefix}…</code> },
          { key: "expires", heading: "Expires", cell: (token) => <When at={token.expiresAt} /> },
          {
            key: "used",
            heading: "Last used",
            wideOnly: true,
            cell: (token) => (token.lastUsedAt ? <When at={token.lastUsedAt} /> : "never"),
          },
          {
            key: "revoke",
            heading: <span className="visually-hidden">Revoke</span>,
            cell: (token) => (
              <Button
                look="quiet"
                onPress={() => void call(revokeToken, { params: { tokenId: token.id } }).then(refresh)}
              >
                Revoke
              </Button>
            ),
          },
        ]}
      />
      <div className="max-w-sm">
        <Form
          key={secret}
          look="plain"
          fields={[{ name: "name", label: "Name of a new token", hint: "Where it is used: “cluster”." }]}
          act="Make a token for 90 days"
          onSend={async ({ name = "" }) => {
            const { data: token } = await call(createToken, { body: { name, scope } })
            setSecret(token.secret)
            await refresh()
          }}
        >
          <Select
            label="Scope"
            value={scope}
            onChange={(event) => setScope(event.target.value as typeof scope)}
            options={[
              { value: "upload", label: "upload: push datasets" },
              { value: "read", label: "read: look at everything" },
              { value: "all", label: "all: act as I do" },
            ]}
          />
        </Form>
      </div>
    </section>
  )
}

function SignIns() {
  const client = useQueryClient()
  const { data = [] } = useQuery({
    queryKey: ["sign-ins"],
    queryFn: async () => (await call(listSignIns)).data.items,
  })
  return (
    <section className="grid gap-3">
      <h2 className="m-0 text-lead">Where you are signed in</h2>
      <Ledger
        caption="Browsers in which you are signed in"
        rows={data}
        rowKey={(entry) => entry.id}
        columns={[
          {
            key: "browser",
            heading: "Browser",
            cell: (entry) => (
              <span className="block max-w-64 truncate" title={entry.userAgent}>
                {entry.userAgent || "unknown"}
              </span>
            ),
          },
          { key: "seen", heading: "Last seen", cell: (entry) => <When at={entry.lastSeenAt} /> },
          {
            key: "end",
            heading: <span className="visually-hidden">Sign out</span>,
            cell: (entry) =>
              entry.current ? (
                "this one"
              ) : (
                <Button
                  look="quiet"
                  onPress={() =>
                    void call(revokeSignIn, { params: { signInId: entry.id } }).then(() =>
                      client.invalidateQueries({ queryKey: ["sign-ins"] }),
                    )
                  }
                >
                  Sign out
                </Button>
              ),
          },
        ]}
      />
      <div>
        <Button look="grave" onPress={() => void leave(() => call(signOutEverywhere))}>
          Sign out everywhere
        </Button>
      </div>
    </section>
  )
}
