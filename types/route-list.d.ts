declare module '#route-list' {
  export const routeList: { method: string, path: string, load: () => Promise<unknown> }[]
}
