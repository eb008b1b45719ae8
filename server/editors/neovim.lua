-- lagwise in Neovim 0.7 or later.
--
-- Set vim.g.lagwise_program before this file is read if the program is not on
-- the search path. Findings appear as diagnostics; vim.lsp.buf.hover() shows
-- the evidence of the request under the cursor, and vim.lsp.buf.code_action()
-- offers the rewrites that answer it.

local clients = {} -- root -> client, for Neovim 0.7

-- The root is the nearest folder above that holds .git, else the file's own.
local function root_of(file)
  local folder = vim.fn.fnamemodify(file, ':p:h')
  local git = vim.fn.finddir('.git', vim.fn.escape(folder, ' ,;\\') .. ';')
  if git ~= '' then
    return vim.fn.fnamemodify(git, ':p:h:h')
  end
  return folder
end

local function attach(buffer, file)
  local config = {
    name = 'lagwise',
    cmd = { vim.g.lagwise_program or 'lagwise', 'attend' },
    root_dir = root_of(file),
  }
  if vim.lsp.start then
    vim.lsp.start(config, { bufnr = buffer })
    return
  end
  local id = clients[config.root_dir]
  if not (id and vim.lsp.get_client_by_id(id)) then
    id = vim.lsp.start_client(config)
    clients[config.root_dir] = id
  end
  vim.lsp.buf_attach_client(buffer, id)
end

vim.api.nvim_create_autocmd({ 'BufReadPost', 'BufNewFile' }, {
  group = vim.api.nvim_create_augroup('lagwise', { clear = true }),
  pattern = { '*.series.toml', '*.analysis.toml', '*.conventions.toml' },
  callback = function(event)
    attach(event.buf, event.file)
  end,
})
