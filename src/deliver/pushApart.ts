/**
 * Places for labels on a line: as near to where each wants to be as is possible without touching, within [from, to], order kept. Given
 * as centres; `widths` include the gap. Null when they don't all fit.
 *
 * Labels that meet become a block that sits at the mean of its wishes (the pooling of isotonic regression): one pass, and the sum of
 * squared shifts is the least.
 */
export function pushApart(
  wishes: readonly number[],
  widths: readonly number[],
  from: number,
  to: number,
): number[] | null {
  const total = widths.reduce((sum, width) => sum + width, 0)
  if (total > to - from) return null
  const order = wishes.map((_, i) => i).sort((a, b) => wishes[a] - wishes[b] || a - b)
  const blocks: Block[] = []
  for (const i of order) {
    let block: Block = { members: [i], width: widths[i], starts: wishes[i] - widths[i] / 2, from: 0 }
    block.from = hold(block.starts, block.width, from, to)
    for (let last = blocks.at(-1); last !== undefined && last.from + last.width > block.from; last = blocks.at(-1)) {
      blocks.pop()
      block = join(last, block, from, to)
    }
    blocks.push(block)
  }
  const centres = new Array<number>(wishes.length)
  for (const block of blocks) {
    let at = block.from
    for (const i of block.members) {
      centres[i] = at + widths[i] / 2
      at += widths[i]
    }
  }
  return centres
}

interface Block {
  members: number[]
  width: number
  /** Sum over the members of where the block would start if that member had its wish. */
  starts: number
  from: number
}

function join(left: Block, right: Block, from: number, to: number): Block {
  const block: Block = {
    members: [...left.members, ...right.members],
    width: left.width + right.width,
    starts: left.starts + right.starts - right.members.length * left.width,
    from: 0,
  }
  block.from = hold(block.starts / block.members.length, block.width, from, to)
  return block
}

function hold(start: number, width: number, from: number, to: number): number {
  return Math.min(Math.max(start, from), to - width)
}
