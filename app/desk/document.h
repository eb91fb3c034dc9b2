// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "studies/board.h"

#include <QObject>
#include <QString>
#include <QUndoStack>
#include <filesystem>

namespace headroom::desk {

/// The project that is open: an immutable snapshot, the way it came here, and where it is kept.
/// One door for every change: a label and the next tree.
class Document final : public QObject {
    Q_OBJECT
public:
    using SnapshotPtr = std::shared_ptr<const studies::Snapshot>;

    Document();

    const plant::Tree& tree() const { return tree_; }
    const SnapshotPtr& snapshot() const { return snapshot_; }
    /// What is wrong or unusual, of the file and of the project as it is now.
    const Findings& findings() const { return findings_; }
    const std::filesystem::path& path() const { return path_; }
    QString name() const; ///< file's name without its endings; "no project" if there is none
    bool open() const { return opened_; }
    /// Whether the file's content is in the tree; else it is not written over.
    bool readable() const { return readable_; }
    bool changed() const { return !undo_.isClean(); }
    QUndoStack& undo() { return undo_; }

    /// Opens a file whatever its faults: what is usable is shown, the rest are findings.
    void openFile(const std::filesystem::path& path);
    /// True if the file was written; else the findings say why not.
    bool save();
    bool saveAs(const std::filesystem::path& path);
    /// Back to no project.
    void close();

    /// The next project, as one undo step. Steps of one `gesture` (≥ 0) that follow each other
    /// are one; an edit that changes nothing is no step.
    void edit(const QString& label, const plant::Tree& next, int gesture = -1);
    /// A number for the next gesture.
    int newGesture() { return ++lastGesture_; }
    /// Takes back the steps of an open gesture, as if it had not begun.
    void undoGesture(int gesture);

signals:
    void opening(); ///< another project comes, or none; before its snapshot
    void snapshotChanged();
    void findingsChanged();
    void fileChanged(); ///< another file, saved, or changed since

private:
    class Edit;
    void show(const plant::Tree& tree);
    void setFindings(Findings findings);

    std::filesystem::path path_;
    plant::Tree tree_;
    SnapshotPtr snapshot_;
    Findings findings_;
    QUndoStack undo_;
    bool opened_ = false;
    bool readable_ = true; ///< false: what the file holds is not in the tree; it is not written over
    int lastGesture_ = 0;
};

} // namespace headroom::desk
