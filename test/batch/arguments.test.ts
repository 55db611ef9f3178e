import { describe, expect, test } from 'vitest'
import { readCommand } from '../../src/batch/arguments'
import { InputError } from '../../src/errors'

const words = (line: string): string[] => line.split(' ').filter((word) => word !== '')

describe('the command line', () => {
  test('list and skin', () => {
    expect(readCommand(['list', '--json'])).toEqual({ name: 'list', json: true })
    expect(readCommand(['skin', 'cube'])).toEqual({ name: 'skin', id: 'cube', fill: 'nonzero', json: false })
    expect(readCommand(words('skin --all --fill evenodd --json'))).toEqual({
      name: 'skin',
      id: 'all',
      fill: 'evenodd',
      json: true,
    })
  })

  test('plan with nothing but what it must have', () => {
    expect(readCommand(words('plan cube --height 250 --out x'))).toEqual({
      name: 'plan',
      id: 'cube',
      heightMm: 250,
      paper: 'a4',
      fill: 'nonzero',
      hand: 'right',
      side: 'outside',
      colours: 'one',
      closeBelowMm: 0,
      nets: 'fewest',
      out: 'x',
    })
  })

  test('plan with all options, in any order and with equals signs', () => {
    const line =
      'plan --out=a --side inside cube --hand left --height=99.5 --paper letter --fill evenodd --colours kind --close-below 0.25 --nets repeat'
    expect(readCommand(words(line))).toMatchObject({
      heightMm: 99.5,
      paper: 'letter',
      fill: 'evenodd',
      hand: 'left',
      side: 'inside',
      colours: 'kind',
      closeBelowMm: 0.25,
      nets: 'repeat',
      out: 'a',
    })
  })

  test.each([['help'], ['--help'], ['plan --help'], ['skin --all --help']])('%s is a request for help', (line) => {
    expect(readCommand(words(line))).toEqual({ name: 'help' })
  })

  test.each([
    ['10', 10],
    ['2000', 2000],
    ['250.', 250],
    ['1999.999', 1999.999],
  ])('the height %s is taken', (told, height) => {
    expect(readCommand(['plan', 'cube', '--out', 'x', '--height', told])).toMatchObject({ heightMm: height })
  })

  test('a model from a file, with a height or with its own unit', () => {
    expect(readCommand(words('plan --file a.obj --height 250 --out x'))).toMatchObject({ file: 'a.obj', heightMm: 250 })
    const kept = readCommand(words('plan --out x --file=a.stl --unit in'))
    expect(kept).toMatchObject({ name: 'plan', file: 'a.stl', unit: 'in' })
    expect(kept).not.toHaveProperty('heightMm')
    expect(readCommand(words('skin --file a.ply --json'))).toEqual({
      name: 'skin',
      file: 'a.ply',
      fill: 'nonzero',
      json: true,
    })
  })

  const wrong: [line: string, message: RegExp][] = [
    ['', /^The command is missing; say list, skin or plan/],
    ['unfold cube', /^There is no command unfold; say list, skin or plan/],
    ['--json', /^There is no command --json/],
    ['list cube', /^list takes no solid; leave cube out/],
    ['list --fill nonzero', /^There is no option --fill; list takes --json\.$/],
    ['list -j', /^There is no option -j; list takes --json\.$/],
    ['list --json=yes', /^--json takes no value/],
    ['skin', /^Say which solid: skin ID or skin --all/],
    ['skin cube --all', /^Say either cube or --all/],
    ['skin cube tetrahedron', /^One solid at a time; tetrahedron is too much/],
    ['skin cube --fill odd', /^--fill is nonzero or evenodd, not odd\.$/],
    ['skin cube --fill', /^--fill needs a value: --fill nonzero or/],
    ['plan --height 250 --out x', /^Say which solid: plan ID --height/],
    ['plan cube --out x', /^The height is missing; say a number of millimetres from 10 to 2000/],
    ['plan cube --out x --height', /^--height needs a value: --height 250/],
    [
      'plan cube --out x --height tall',
      /^The height tall is not a number; say a number of millimetres from 10 to 2000/,
    ],
    ['plan cube --out x --height 250mm', /^The height 250mm is not a number/],
    ['plan cube --out x --height 0xff', /^The height 0xff is not a number/],
    ['plan cube --out x --height Infinity', /^The height Infinity is not a number/],
    ['plan cube --out x --height 9.99', /^The height 9.99 is out of range; say .* from 10 to 2000/],
    ['plan cube --out x --height 2000.01', /^The height 2000.01 is out of range/],
    ['plan cube --out x --height=-250', /^The height -250 is out of range/],
    ['plan cube --out x --height -250', /^--height needs a value/],
    ['plan cube --height 250', /^Say where to write .* --out my-plan/],
    ['plan cube --height 250 --out=', /^Say where to write/],
    ['plan cube --height 250 --out x --paper a5', /^--paper is a4 or letter, not a5/],
    ['plan cube --height 250 --out x --hand both', /^--hand is left or right, not both/],
    ['plan cube --height 250 --out x --side top', /^--side is outside or inside, not top/],
    ['plan cube --file a.obj --height 250 --out x', /^Say either cube or --file, not both/],
    ['plan --file a.obj --out x', /^The height is missing/],
    ['plan --file a.obj --height 250 --unit mm --out x', /^Say either --height or --unit, not both/],
    ['plan --file a.obj --unit ft --out x', /^--unit is mm, cm, m, in, not ft/],
    ['plan cube --unit mm --out x', /^--unit goes with --file/],
    ['plan --file= --height 250 --out x', /^Say which file/],
    ['plan --file', /^--file needs a value: --file model.obj/],
    ['skin --file a.obj --all', /^Say either --file or --all/],
    ['plan cube --height 250 --out x --close-below 3', /^--close-below is a number of millimetres from 0 to 2/],
    ['plan cube --height 250 --out x --close-below thin', /for example 0.3, not thin/],
    ['plan cube --height 250 --out x --nets many', /^--nets is fewest or repeat or modules or single, not many/],
    ['plan cube --height 250 --out x --scale 2', /^There is no option --scale; plan takes --height, --out, --paper/],
  ]
  test.each(wrong)('"%s" is refused in one line that says what would be right', (line, message) => {
    const error = (() => {
      try {
        readCommand(words(line))
      } catch (thrown) {
        return thrown
      }
      return undefined
    })()
    expect(error).toBeInstanceOf(InputError)
    const said = (error as InputError).message
    expect(said).toMatch(message)
    expect(said).not.toContain('\n')
  })
})
