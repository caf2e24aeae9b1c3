// Saves one state after another through the built store until it is killed, and says which are done.
const [store, folder, seed] = process.argv.slice(2)
const { StateStore } = await import(store)
const states = new StateStore(folder)
const first = Number(seed)
for (let n = first; ; n++) {
  // Of very different sizes, so that a torn one would show.
  const filling = String.fromCharCode(97 + (n % 26)).repeat(((n * 7919) % 60) * 1000)
  await states.save(JSON.stringify({ n, filling }), [])
  process.stdout.write(`${n}\n`)
}
