/** Entry of the command line: `npm run --silent batch -- list | skin | plan …`, see `usage`. */
import { InputError } from '../errors'
import { readCommand, usage } from './arguments'
import { list } from './list'
import { skin, skinOfFile } from './skin'

const run = async (args: readonly string[]): Promise<string> => {
  const command = readCommand(args)
  switch (command.name) {
    case 'help':
      return usage
    case 'list':
      return list(command.json)
    case 'skin':
      return 'file' in command
        ? skinOfFile(command.file, command.fill, command.json)
        : skin(command.id, command.fill, command.json)
    case 'plan':
      // Late, so that the other commands need not load clipping and PDF.
      return (await import('./plan')).plan(command)
  }
}

// A reader that stops early, like head, is no failure.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error
})

try {
  process.stdout.write(`${await run(process.argv.slice(2))}\n`)
} catch (error) {
  if (error instanceof InputError) {
    process.stderr.write(`${error.message.replace(/\s*\n\s*/g, ' ')}\n`)
    process.exitCode = 2
  } else {
    process.stderr.write(`${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`)
    process.exitCode = 1
  }
}
