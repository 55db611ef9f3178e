import { describe, expect, test } from 'vitest'
import { determinant, dot, norm, normalize, sub, type Vec3 } from '../../src/geometry/vec3'
import { Camera, turnBetween } from '../../src/preview/camera'
import { randomDirection, randomRotation, seeded } from '../support/random'

const randomCamera = (seed: number): { camera: Camera; random: () => number } => {
  const random = seeded(seed)
  const camera = new Camera()
  camera.resize(300 + 600 * random(), 200 + 500 * random())
  camera.setRotation(randomRotation(random))
  camera.setSpread(1 + random())
  camera.zoomAt(0.6 + 3 * random(), camera.width * random(), camera.height * random())
  return { camera, random }
}

const pointIn = (random: () => number, radius: number): Vec3 => {
  const [x, y, z] = randomDirection(random)
  const r = radius * Math.cbrt(random())
  return [r * x, r * y, r * z]
}

describe('camera', () => {
  test.each([1, 2, 3])('the matrix for WebGL and the projection for the z-buffer agree, seed %i', (seed) => {
    const { camera, random } = randomCamera(seed)
    const m = camera.clipMatrix()
    const [near, far] = camera.depthRange
    for (let i = 0; i < 100; i++) {
      const p = pointIn(random, camera.spread)
      const [x, y, z, w] = [0, 1, 2, 3].map((r) => m[r]! * p[0] + m[4 + r]! * p[1] + m[8 + r]! * p[2] + m[12 + r]!) as [
        number,
        number,
        number,
        number,
      ]
      const screen = camera.project(p)
      expect(((x / w + 1) * camera.width) / 2).toBeCloseTo(screen.x, 8)
      expect(((1 - y / w) * camera.height) / 2).toBeCloseTo(screen.y, 8)
      expect(1 / w).toBeCloseTo(screen.inverse, 10)
      // Nothing of the model is cut off by the near or far plane; depth runs from −1 near to 1 far.
      expect(Math.abs(z / w)).toBeLessThan(1)
      expect(z / w).toBeCloseTo((far + near) / (far - near) - (2 * far * near) / ((far - near) * w), 8)
    }
  })

  test.each([4, 5, 6])('the line of sight through a projected point meets it, seed %i', (seed) => {
    const { camera, random } = randomCamera(seed)
    for (let i = 0; i < 100; i++) {
      const p = pointIn(random, camera.spread)
      const { x, y, inverse } = camera.project(p)
      const { origin, direction } = camera.ray(x, y)
      for (const k of [0, 1, 2]) expect(origin[k]! + direction[k]! / inverse).toBeCloseTo(p[k]!, 8)
    }
  })

  test('the whole sphere is in the picture, and fills most of it', () => {
    const camera = new Camera()
    camera.resize(800, 500)
    camera.setSpread(1.7)
    const random = seeded(7)
    let reach = 0
    for (let i = 0; i < 4000; i++) {
      const d = randomDirection(random)
      const { x, y } = camera.project([1.7 * d[0], 1.7 * d[1], 1.7 * d[2]])
      reach = Math.max(reach, Math.hypot(x - 400, y - 250))
    }
    expect(reach).toBeLessThan(250)
    expect(reach).toBeGreaterThan(225)
  })

  test('ten thousand small turns leave a rotation', () => {
    const { camera, random } = randomCamera(8)
    for (let i = 0; i < 10_000; i++) camera.orbit(random() - 0.5, random() - 0.5, random() - 0.5)
    for (const [i, row] of camera.rotation.entries())
      for (const [j, other] of camera.rotation.entries()) expect(dot(row, other)).toBeCloseTo(i === j ? 1 : 0, 12)
    expect(determinant(camera.rotation)).toBeCloseTo(1, 12)
  })

  test('a matrix that is no longer quite a rotation is made one', () => {
    const { camera, random } = randomCamera(13)
    camera.setRotation(camera.rotation.map((row) => row.map((v) => 1.01 * v + 0.01 * random())) as never)
    for (const [i, row] of camera.rotation.entries())
      for (const [j, other] of camera.rotation.entries()) expect(dot(row, other)).toBeCloseTo(i === j ? 1 : 0, 12)
  })

  test('a drag to the right moves the near side to the right, a drag downwards moves it down', () => {
    const camera = new Camera([0, 0, 1])
    camera.resize(400, 400)
    const at = (): { x: number; y: number } => camera.project([0, 0, 1])
    const before = at()
    camera.orbit(0.2, 0)
    expect(at().x).toBeGreaterThan(before.x + 10)
    camera.orbit(0, 0.2)
    expect(at().y).toBeGreaterThan(before.y + 10)
  })

  test.each([9, 10])('zooming keeps what is under the pointer there, seed %i', (seed) => {
    const { camera, random } = randomCamera(seed)
    camera.zoom = 1
    camera.setShift([0, 0])
    const p = pointIn(random, 0.5)
    const before = camera.project(p)
    camera.zoomAt(1.8, before.x, before.y)
    const after = camera.project(p)
    expect(after.x).toBeCloseTo(before.x, 8)
    expect(after.y).toBeCloseTo(before.y, 8)
    const zoom = camera.zoom
    camera.zoomAt(1e9)
    camera.zoomAt(1e-12)
    expect(camera.zoom).toBeLessThan(zoom)
    expect(camera.zoom).toBeGreaterThan(0.1)
  })

  test('panning moves the picture by as many pixels', () => {
    const { camera, random } = randomCamera(11)
    camera.setShift([0, 0])
    const p = pointIn(random, 0.5)
    const before = camera.project(p)
    camera.pan(13, -7)
    const after = camera.project(p)
    expect(after.x - before.x).toBeCloseTo(13, 8)
    expect(after.y - before.y).toBeCloseTo(-7, 8)
  })

  test('the first direction faces the viewer', () => {
    const direction = normalize([1, -2, 0.5])
    const camera = new Camera(direction)
    const nearest = camera.project(direction)
    const random = seeded(12)
    for (let i = 0; i < 200; i++) expect(camera.project(randomDirection(random)).inverse).toBeLessThan(nearest.inverse)
  })
})

describe('turnBetween', () => {
  test.each([1, 2, 3])('takes one direction to the other by the shortest way, seed %i', (seed) => {
    const random = seeded(seed)
    const [a, b] = [randomDirection(random), randomDirection(random)]
    const turn = turnBetween(a, b)
    for (const [k, row] of turn.entries()) expect(dot(row, a)).toBeCloseTo(b[k]!, 12)
    // Trace of a rotation by angle α: 1 + 2 cos α; here α is the angle between the two.
    expect(turn[0][0] + turn[1][1] + turn[2][2]).toBeCloseTo(1 + 2 * dot(a, b), 12)
    const half = turnBetween(a, b, 0.5)
    const middle = half.map((row) => dot(row, a)) as unknown as Vec3
    expect(norm(sub(middle, a))).toBeCloseTo(norm(sub(middle, b)), 12)
  })

  test('works for equal and for opposite directions', () => {
    const random = seeded(4)
    for (let i = 0; i < 50; i++) {
      const a = randomDirection(random)
      const opposite: Vec3 = [-a[0], -a[1], -a[2]]
      for (const to of [a, opposite]) {
        const turn = turnBetween(a, to)
        expect(determinant(turn)).toBeCloseTo(1, 10)
        for (const [k, row] of turn.entries()) expect(dot(row, a)).toBeCloseTo(to[k]!, 10)
      }
    }
  })
})
