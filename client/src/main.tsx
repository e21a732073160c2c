import { StrictMode } from 'react'
import { createRoot } from 'react-dom/client'
import { Application } from './app/application.tsx'
import './styles.css'
import './text-page.css'
import './print.css'

const root = document.getElementById('root')
if (!root) throw new Error('index.html has no element #root')
createRoot(root).render(
  <StrictMode>
    <Application />
  </StrictMode>,
)
