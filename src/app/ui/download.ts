/** Hands a file to the builder. */
export const download = (name: string, content: BlobPart, type: string): void => {
  const link = document.createElement('a')
  const url = URL.createObjectURL(new Blob([content], { type }))
  link.href = url
  link.download = name
  document.body.append(link)
  link.click()
  link.remove()
  // The browser has begun to read it by then.
  setTimeout(() => URL.revokeObjectURL(url), 60_000)
}
