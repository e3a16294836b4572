if vim.fn.has('nvim-0.11') == 0 then
  vim.notify('partwright needs Neovim 0.11 or newer.', vim.log.levels.WARN)
  return
end

vim.lsp.enable('partwright')

-- Neovim itself is silent about a server that is not there.
vim.api.nvim_create_autocmd('FileType', {
  pattern = 'voicesheet',
  callback = function()
    local cmd = vim.lsp.config.partwright.cmd
    if type(cmd) == 'table' and vim.fn.executable(cmd[1]) == 0 then
      vim.notify_once(cmd[1] .. ' is not on the PATH: no sheet is checked.', vim.log.levels.WARN)
    end
  end,
})
