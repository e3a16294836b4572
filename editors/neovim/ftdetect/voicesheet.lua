-- The file type is the notation's language id, which Neovim passes to the server as it is.
vim.filetype.add({ extension = { voices = 'voicesheet' } })
