-- Found by name by `vim.lsp.enable('partwright')`.
return {
  cmd = { 'partwright', 'serve' },
  filetypes = { 'voicesheet' },
  root_markers = { 'partwright.toml', '.git' },
}
