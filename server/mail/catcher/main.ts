import { startCatcher } from './catcher.ts'

/*
 * The mail catcher as a process of its own, started by `npm start`: folder and ports come as arguments, the answer goes back over
 * the IPC channel. It ends when it is told to, or when the process that started it is gone.
 */
const [folder = '', smtpPort = '0', readerPort = '0'] = process.argv.slice(2)
const catcher = await startCatcher({ folder, smtpPort: Number(smtpPort), readerPort: Number(readerPort) })
process.send?.({ ready: true, address: `http://127.0.0.1:${catcher.readerPort}` })

const stop = () => void catcher.close().then(() => process.exit(0))
process.on('SIGTERM', stop)
process.on('SIGINT', stop)
process.on('disconnect', stop)
