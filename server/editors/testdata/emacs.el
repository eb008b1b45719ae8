;;; One sitting in Emacs, as in neovim.lua. -*- lexical-binding: t -*-

(require 'package)
(package-initialize)
(load (getenv "SETUP"))
(require 'json)

(defvar seen nil "What was seen, for the file named by SEEN.")
(defconst deadline 30)

(defun finish ()
  (with-temp-file (getenv "SEEN") (insert (json-encode seen)))
  (kill-emacs 0))

(defun await (what happened)
  "Wait until HAPPENED returns non-nil; the sitting ends when it does not."
  (let ((until (+ (float-time) deadline)) got)
    (while (not (or (setq got (funcall happened)) (> (float-time) until)))
      (accept-process-output nil 0.05))
    (unless got
      (push (cons 'missed what) seen)
      (finish))
    got))

(defun finding ()
  "The flymake diagnostic of the rule, if there is one."
  (seq-find (lambda (d) (string-match-p (regexp-quote (getenv "RULE")) (flymake-diagnostic-text d)))
            (flymake-diagnostics)))

(defun sitting ()
  (setq lagwise-program (getenv "PROGRAM")
        eglot-sync-connect t eglot-autoreconnect nil
        eglot-confirm-server-initiated-edits nil
        make-backup-files nil create-lockfiles nil)
  (find-file (getenv "DOCUMENT"))
  (push (cons 'mode (symbol-name major-mode)) seen)
  ;; What eglot-ensure does after the next command, of which batch has none.
  (apply #'eglot (eglot--guess-contact))
  (flymake-mode 1)
  (flymake-start)
  (let ((found (await "the finding" #'finding)))
    (push (cons 'message (flymake-diagnostic-text found)) seen)
    (goto-char (flymake-diagnostic-beg found)))
  (let ((hover (jsonrpc-request (eglot-current-server) :textDocument/hover (eglot--TextDocumentPositionParams))))
    (push (cons 'hover (plist-get (plist-get hover :contents) :value)) seen))
  ;; A person would press return on the default, which is the preferred one.
  (cl-letf ((last-nonmenu-event t)
            ((symbol-function 'completing-read)
             (lambda (_prompt _items &optional _pred _match _initial _history default)
               (push (cons 'title default) seen)
               default)))
    (let ((tick (buffer-chars-modified-tick)))
      (eglot-code-actions (point) (point) nil t)
      (await "the rewrite" (lambda () (> (buffer-chars-modified-tick) tick)))))
  (eglot--signal-textDocument/didChange)
  (save-buffer)
  (await "the end of the finding" (lambda () (flymake-start) (not (finding))))
  (eglot-shutdown (eglot-current-server))
  (finish))

(condition-case trouble
    (sitting)
  (error (push (cons 'trouble (format "%S" trouble)) seen)
         (finish)))
