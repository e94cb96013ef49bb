import { useQuery, useQueryClient } from "@tanstack/react-query"
import { useState } from "react"
import { Form } from "@/components/account/form"
import { Button } from "@/components/parts/button"
import { Select } from "@/components/parts/field"
import { Ledger } from "@/components/parts/ledger"
import { MarginNote } from "@/components/parts/note"
import { When } from "@/components/parts/when"
import { call, sentenceOf } from "@/lib/client/call"
import { Island } from "@/lib/client/island"
import {
  changeMember,
  invite,
  leaveManuscript,
  listInvitations,
  listMembers,
  type MemberAnswer,
  removeMember,
  revokeInvitation,
} from "@/lib/contracts/people"
import { roleMay, roles, type Role } from "@/lib/domain/policy"

export const roleOptions = [
  { value: "corresponding-author", label: "corresponding author" },
  { value: "co-author", label: "co-author" },
  { value: "reader", label: "reader" },
] as const satisfies readonly { value: Role; label: string }[]

interface Props {
  readonly manuscriptId: string
  readonly role: Role
  readonly personId: string
  readonly members: readonly MemberAnswer[]
}

/** Who takes part in a manuscript, and the way in. */
export function PeoplePage(props: Props) {
  return (
    <Island>
      <People {...props} />
    </Island>
  )
}

function People({ manuscriptId, role, personId, members: initial }: Props) {
  const client = useQueryClient()
  const params = { manuscriptId }
  const { data: members } = useQuery({
    queryKey: ["members"],
    queryFn: async () => (await call(listMembers, { params })).data.items,
    initialData: initial as MemberAnswer[],
  })
  const [problem, setProblem] = useState<string | null>(null)
  const mayManage = roleMay(role, "people.manage")
  const act = async (doing: () => Promise<unknown>) => {
    setProblem(null)
    try {
      await doing()
    } catch (error) {
      setProblem(sentenceOf(error))
    }
    await client.invalidateQueries()
  }
  return (
    <div className="sheet">
      <div className="grid min-w-0 content-start gap-6">
        <h1 className="m-0 text-title">People</h1>
        {problem && <MarginNote weight="wrong">{problem}</MarginNote>}
        <Ledger
          caption="People of this manuscript"
          rows={members}
          rowKey={(member) => member.personId}
          columns={[
            { key: "name", heading: "Name", cell: (member) => member.name },
            { key: "email", heading: "E-mail", wideOnly: true, cell: (member) => member.email },
            {
              key: "role",
              heading: "Role",
              cell: (member) =>
                mayManage ? (
                  <select
                    aria-label={`Role of ${member.name}`}
                    value={member.role}
                    onChange={(event) =>
                      void act(() =>
                        call(changeMember, {
                          params: { manuscriptId, personId: member.personId },
                          body: { role: event.target.value as Role },
                        }),
                      )
                    }
                    className="min-h-6 rounded-sheet border border-rule bg-raised"
                  >
                    {roleOptions.map((option) => (
                      <option key={option.value} value={option.value}>
                        {option.label}
                      </option>
                    ))}
                  </select>
                ) : (
                  roleOptions.find((option) => option.value === member.role)?.label
                ),
            },
            { key: "since", heading: "Since", wideOnly: true, cell: (member) => <When at={member.since} /> },
            {
              key: "remove",
              heading: <span className="visually-hidden">Remove</span>,
              cell: (member) =>
                member.personId === personId ? (
                  <Button
                    look="quiet"
                    onPress={() =>
                      void act(async () => {
                        await call(leaveManuscript, { params })
                        location.assign("/")
                      })
                    }
                  >
                    Leave
                  </Button>
                ) : (
                  mayManage && (
                    <Button
                      look="quiet"
                      onPress={() =>
                        void act(() =>
                          call(removeMember, { params: { manuscriptId, personId: member.personId } }),
                        )
                      }
                    >
                      Remove
                    </Button>
                  )
                ),
            },
          ]}
        />
        {mayManage && <Invitations manuscriptId={manuscriptId} onAct={act} />}
      </div>
      {mayManage && (
        <aside className="grid content-start gap-3" aria-label="Invite">
          <h2 className="label m-0">Invite</h2>
          <Invite manuscriptId={manuscriptId} onInvited={() => void client.invalidateQueries()} />
        </aside>
      )}
    </div>
  )
}

function Invite({ manuscriptId, onInvited }: { manuscriptId: string; onInvited: () => void }) {
  const [role, setRole] = useState<Role>("co-author")
  const [invited, setInvited] = useState<string | null>(null)
  return (
    <>
      {invited && (
        <p className="m-0 text-small" role="status">
          A mail with a link is on its way to {invited}.
        </p>
      )}
      <Form
        key={invited}
        fields={[{ name: "email", label: "E-mail", type: "email", autoComplete: "off" }]}
        act="Send invitation"
        onSend={async ({ email = "" }) => {
          await call(invite, { params: { manuscriptId }, body: { email, role } })
          setInvited(email)
          onInvited()
        }}
      >
        <Select
          label="Role"
          value={role}
          onChange={(event) => setRole(roles.find((known) => known === event.target.value) ?? "co-author")}
          options={roleOptions}
        />
      </Form>
    </>
  )
}

function Invitations({
  manuscriptId,
  onAct,
}: {
  manuscriptId: string
  onAct: (doing: () => Promise<unknown>) => Promise<void>
}) {
  const { data = [] } = useQuery({
    queryKey: ["invitations"],
    queryFn: async () => (await call(listInvitations, { params: { manuscriptId } })).data.items,
  })
  if (data.length === 0) return null
  return (
    <section>
      <h2 className="m-0 text-lead">Waiting for an answer</h2>
      <Ledger
        caption="Invitations that wait for an answer"
        rows={data}
        rowKey={(invitation) => invitation.id}
        columns={[
          { key: "email", heading: "E-mail", cell: (invitation) => invitation.email },
          { key: "role", heading: "Role", cell: (invitation) => invitation.role.replace("-", " ") },
          { key: "until", heading: "Until", cell: (invitation) => <When at={invitation.expiresAt} /> },
          {
            key: "revoke",
            heading: <span className="visually-hidden">Take back</span>,
            cell: (invitation) => (
              <Button
                look="quiet"
                onPress={() =>
                  void onAct(() =>
                    call(revokeInvitation, { params: { manuscriptId, invitationId: invitation.id } }),
                  )
                }
              >
                Take back
              </Button>
            ),
          },
        ]}
      />
    </section>
  )
}
