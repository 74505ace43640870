/** False until the page answers to taps, so that a form is not filled in for nothing. */
export function useHydrated() {
  const hydrated = ref(false)
  onMounted(() => {
    hydrated.value = true
  })
  return hydrated
}
