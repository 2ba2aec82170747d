export default defineTask({ meta: { name: 'reminders:queue', description: 'Sends what is due in the mail queue' }, run: () => ({ result: 0 }) })
