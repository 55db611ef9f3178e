/** A square pyramid with its base as two triangles; one unit is an inch. */
export const pyramid = `# demo
v 0 0 0
v 2 0 0
v 2 2 0
v 0 2 0
v 1 1 1.5
f 1 3 2
f 1 4 3
f 1 2 5
f 2 3 5
f 3 4 5
f 4 1 5
`
