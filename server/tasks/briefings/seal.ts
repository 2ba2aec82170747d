export default defineTask({ meta: { name: 'briefings:seal', description: 'Sends what is due in the mail queue' }, run: () => ({ result: 0 }) })
