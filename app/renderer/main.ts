import { createPinia } from 'pinia'
import { createApp } from 'vue'
import App from './App.vue'
import { browserHost } from './browser-host'
import { hostKey } from './host-key'
import './style.css'

createApp(App)
  .use(createPinia())
  .provide(hostKey, window.host ?? browserHost)
  .mount('#app')
