// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/document.h"

#include "desk/messages.h"
#include "files/project_file.h"

#include <QUndoCommand>

namespace headroom::desk {

/// One step: what was, what is, and the gesture it belongs to.
class Document::Edit final : public QUndoCommand {
public:
    Edit(Document& document, const QString& label, plant::Tree after, int gesture)
        : QUndoCommand(label), document_(document), before_(document.tree_),
          after_(std::move(after)), gesture_(gesture) {}

    int id() const override { return gesture_; }
    void undo() override { document_.show(before_); }
    void redo() override { document_.show(after_); }
    bool mergeWith(const QUndoCommand* later) override {
        after_ = static_cast<const Edit*>(later)->after_;
        setText(later->text());
        setObsolete(sameContent(before_, after_));
        return true;
    }

private:
    Document& document_;
    plant::Tree before_, after_;
    int gesture_;
};

Document::Document() : snapshot_(studies::makeSnapshot(plant::Bound{})) {
    connect(&undo_, &QUndoStack::cleanChanged, this, &Document::fileChanged);
}

QString Document::name() const {
    if (!opened_) {
        return tr("no project");
    }
    auto name = QString::fromStdString(path_.filename().string());
    for (const auto* ending : {".json", ".headroom"}) {
        if (name.endsWith(QLatin1String(ending))) {
            name.chop(QLatin1String(ending).size());
        }
    }
    return name;
}

void Document::openFile(const std::filesystem::path& path) {
    auto opened = files::openProject(path);
    emit opening();
    path_ = path;
    tree_ = opened.tree;
    opened_ = true;
    readable_ = opened.tree.isObject();
    undo_.clear();
    auto found = opened.bound.findings;
    snapshot_ = studies::makeSnapshot(std::move(opened.bound));
    emit snapshotChanged();
    setFindings(std::move(found));
    emit fileChanged();
}

void Document::close() {
    emit opening();
    path_.clear();
    tree_ = {};
    opened_ = false;
    readable_ = true;
    undo_.clear();
    snapshot_ = studies::makeSnapshot(plant::Bound{});
    emit snapshotChanged();
    setFindings({});
    emit fileChanged();
}

bool Document::save() {
    if (!opened_) {
        setFindings({Finding{.message = &say::noName}});
        return false;
    }
    return saveAs(path_);
}

bool Document::saveAs(const std::filesystem::path& path) {
    auto found = snapshot_->bound->findings;
    if (!readable_ && path == path_) {
        found.insert(found.begin(), Finding{.message = &say::notOverwritten,
                                            .arguments = {{"file", path.filename().string()}}});
        setFindings(std::move(found));
        return false;
    }
    const auto saved = files::saveProject(tree_, path);
    if (!saved) {
        found.insert(found.begin(), saved.findings().begin(), saved.findings().end());
        setFindings(std::move(found));
        return false;
    }
    path_ = path;
    opened_ = true;
    readable_ = true;
    undo_.setClean();
    setFindings(std::move(found));
    emit fileChanged();
    return true;
}

void Document::edit(const QString& label, const plant::Tree& next, int gesture) {
    if (!sameContent(next, tree_)) {
        undo_.push(new Edit(*this, label, next, gesture));
    }
}

void Document::undoGesture(int gesture) {
    const auto* last = undo_.index() > 0 ? undo_.command(undo_.index() - 1) : nullptr;
    if (last != nullptr && gesture >= 0 && last->id() == gesture) {
        undo_.undo();
    }
}

void Document::show(const plant::Tree& tree) {
    tree_ = tree;
    auto bound = files::rebind(tree);
    auto found = bound.findings;
    snapshot_ = studies::makeSnapshot(std::move(bound), snapshot_.get());
    emit snapshotChanged();
    setFindings(std::move(found));
    emit fileChanged();
}

void Document::setFindings(Findings findings) {
    findings_ = std::move(findings);
    emit findingsChanged();
}

} // namespace headroom::desk
