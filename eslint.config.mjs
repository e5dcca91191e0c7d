import './scripts/lib/group-by.mjs'
import withNuxt from './.nuxt/eslint.config.mjs'

export default withNuxt(
  { ignores: ['.data*/**', '.output*/**', '.reports/**', 'docs/**'] },
  {
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      'vue/multi-word-component-names': 'off',
      // v-html is allowed in one file, right after the cleaner: components/ui/Markdown.vue says so at the line.
      'vue/no-v-html': 'error',
      'vue/html-self-closing': 'off',
      'no-console': 'off',
      // Refusing control characters takes naming them.
      'no-control-regex': 'off',
    },
  },
)
