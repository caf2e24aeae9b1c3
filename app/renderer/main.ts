import { createPinia } from 'pinia'
import { createApp } from 'vue'
import { lotAnalyzer } from './analysis'
import App from './App.vue'
import { browserHost } from './browser-host'
import { checkedHost } from './checked-host'
import { hostKey } from './host-key'
import './style.css'

// The worker loads the pipeline while the window is drawn: the first lot need not wait for it.
lotAnalyzer.warm()

createApp(App)
  .use(createPinia())
  .provide(hostKey, checkedHost(window.host ?? browserHost))
  .mount('#app')
