import { describe } from 'vitest'
import { wholeWay } from './whole-way'

describe('solids with an even index, turned and shuffled, at 250 mm on A4', () => {
  wholeWay(0)
})
