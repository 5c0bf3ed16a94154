/** AssemblyScript. What the kernel exports. */
export {
  RAt, TAt, dMuAt, dQAt, dWAt, logAt, mediumAt, muAt, qAt, reserve, widthAt,
} from './layout'
export { spectrum } from './spectrum'
export { gradientBegin, gradientBlock } from './gradient'
