/** Seconds left, counted on this device from what the server said, so that a wrong clock on the phone does no harm. */
export function useCountdown(secondsLeft: number) {
  const left = ref(secondsLeft)
  let timer: ReturnType<typeof setInterval> | undefined
  onMounted(() => {
    const start = performance.now()
    timer = setInterval(() => {
      left.value = Math.max(0, secondsLeft - Math.floor((performance.now() - start) / 1000))
    }, 1000)
  })
  onBeforeUnmount(() => clearInterval(timer))
  return { left, minutes: computed(() => Math.ceil(left.value / 60)), isOver: computed(() => left.value <= 0) }
}
