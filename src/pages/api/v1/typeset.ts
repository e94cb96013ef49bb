import { typesetMath as contract } from "@/lib/contracts/typeset"
import { typesetMath } from "@/lib/render/typeset/typesetter"
import { endpoint } from "@/lib/server/http/endpoint"

export const POST = endpoint(contract, async ({ body }) => ({
  boxes: await Promise.all(
    body.tex.map(async (tex) => {
      const set = await typesetMath(tex)
      return "error" in set ? { box: null, problem: set.error.message } : { box: set, problem: null }
    }),
  ),
}))
