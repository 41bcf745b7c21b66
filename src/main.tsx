import { StrictMode } from 'react'
import { createRoot } from 'react-dom/client'
import { QueryClientProvider } from '@tanstack/react-query'
import { RouterProvider } from 'react-router-dom'
import { createQueryClient } from './api/queryClient.ts'
import { copyRawValues } from './lib/copyRaw.ts'
import { applyTheme } from './lib/theme.ts'
import { createRouter } from './router.tsx'
import './styles.css'

applyTheme()
copyRawValues(document)

const root = document.getElementById('root')
if (!root) throw new Error('index.html has no element with id "root"')
createRoot(root).render(
  <StrictMode>
    <QueryClientProvider client={createQueryClient()}>
      <RouterProvider router={createRouter()} />
    </QueryClientProvider>
  </StrictMode>,
)
