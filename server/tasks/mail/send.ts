export default defineTask({ meta: { name: 'mail:send', description: 'Sends what is due in the mail queue' }, run: () => ({ result: 0 }) })
