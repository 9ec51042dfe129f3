// The design planned beside the design found, word by word. "Design not met" is never mixed with "criterion not met".
import type { DesignPromise } from '../definition/study.ts'
import type { DesignLine } from './record.ts'
import type { RanBlock } from './run-blocks.ts'

export function designLines(ran: readonly RanBlock[], promises: readonly DesignPromise[]): readonly DesignLine[] {
  return ran.flatMap((each) => {
    const planned = promises.find((promise) => promise.characteristic === each.block.characteristic)?.counts ?? {}
    const words = [...new Set([...Object.keys(planned), ...Object.keys(each.design)])]
    return words.map((word): DesignLine => {
      const [promised, found] = [planned[word], each.design[word]]
      return {
        characteristic: each.block.characteristic, block: each.block.id, measurand: each.measurand, word,
        ...(promised === undefined ? {} : { planned: promised }), ...(found === undefined ? {} : { found }),
        met: promised === undefined || (found !== undefined && found >= promised),
      }
    })
  })
}
